import { Form } from "react-router"
import { dayWords } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { Button } from "~/ui/forms/button"
import { EmptyLine } from "~/ui/layout/sheet"

export type ChoosableSuper = {
	id: string
	label: string
	yardName: string
	productName: string
	productDetail: string
	capacityPieces: number
	isReady: boolean
	isClearing: boolean
	checkedOn: string | null
	cappedPercent: number | null
}

function standing({ isClearing, cappedPercent, checkedOn }: ChoosableSuper): string {
	const seen =
		cappedPercent === null || checkedOn === null
			? "not looked at yet"
			: `${cappedPercent} % capped on ${dayWords(checkedOn)}`
	return isClearing ? `bee escape in, ${seen}` : seen
}

/** The supers on hives, each with a box to choose it: those that are ready stand first and are chosen already. */
export function SuperChoice({ supers }: { supers: readonly ChoosableSuper[] }) {
	if (supers.length === 0) return <EmptyLine>No super is on a hive here. Supers are set on under Crop.</EmptyLine>
	return (
		<Form method="get">
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col">Super</th>
						<th scope="col">Product</th>
						<th scope="col" className="max-desk:hidden">
							As last seen
						</th>
						<th scope="col" className="num pr-4! desk:pr-8!">
							Holds
						</th>
					</tr>
				</thead>
				<tbody>
					{supers.map((one) => (
						<tr key={one.id}>
							<td>
								<div className="check items-center">
									<input
										id={`super-${one.id}`}
										type="checkbox"
										name="super"
										value={one.id}
										defaultChecked={one.isReady || one.isClearing}
									/>
									<label className="py-1" htmlFor={`super-${one.id}`}>
										<b>{one.label}</b>
										<span className="note block">{one.yardName}</span>
									</label>
								</div>
							</td>
							<td>
								{one.productName}
								<span className="note block">{one.productDetail}</span>
								<span className="note block desk:hidden">{standing(one)}</span>
							</td>
							<td className="max-desk:hidden">
								{one.isReady && <b>Ready: </b>}
								{standing(one)}
							</td>
							<td className="num pr-4! desk:pr-8!">{piecesWords(one.capacityPieces)}</td>
						</tr>
					))}
				</tbody>
			</table>
			<div className="px-4 py-4 desk:px-8">
				<Button variant="primary" size="big">
					Count what came off these
				</Button>
			</div>
		</Form>
	)
}
