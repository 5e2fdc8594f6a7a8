import { Form } from "react-router"
import { fullDay } from "~/domain/calendar"
import { colourByPfund } from "~/domain/grading/colour"
import { moistureAdvice } from "~/domain/lots/keeping"
import { Button } from "~/ui/forms/button"
import { MarginNote } from "~/ui/layout/sheet"

export type LookedAtProduct = {
	productId: string
	name: string
	detail: string
	moistureTenths: number | null
	pfundTenths: number | null
	flora: string
	bestBeforeOn: string
	lots: { grade: string; pieces: number }[]
	/** In the order of the lots: the code that each gets when its field is left empty. */
	proposedCodes: string[]
}

/** What water in comb does, in words with their source; nothing where there is nothing to say. */
export function MoistureWords({ moistureTenths }: { moistureTenths: number | null }) {
	const advice = moistureTenths === null ? null : moistureAdvice(moistureTenths)
	if (!advice) return null
	return (
		<MarginNote>
			{advice.isOverLimit && <b className="short">May ferment. </b>}
			{advice.words} <span className="note">Source: {advice.source}. Local rules decide.</span>
		</MarginNote>
	)
}

/** The lots that a harvest would become, to be looked at before they are made. What was typed goes along. */
export function HarvestLook({
	products,
	typed,
	errorOf,
}: {
	products: readonly LookedAtProduct[]
	typed: Readonly<Record<string, string>>
	errorOf: (id: string) => string | undefined
}) {
	const pieces = products.reduce((all, { lots }) => all + lots.reduce((sum, lot) => sum + lot.pieces, 0), 0)
	return (
		<Form method="post">
			{Object.entries(typed)
				.filter(([name]) => !name.startsWith("code-"))
				.map(([name, value]) => (
					<input type="hidden" name={name} value={value} key={name} />
				))}
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col">Lot</th>
						<th scope="col">Lot code</th>
						<th scope="col" className="num pr-4! desk:pr-8!">
							Pieces
						</th>
					</tr>
				</thead>
				<tbody>
					{products.flatMap(({ productId, name, detail, lots, proposedCodes }) =>
						lots.map((lot, index) => {
							const id = `code-${productId}-${index}`
							const error = errorOf(`code-${productId}-${lot.grade}`)
							return (
								<tr key={id}>
									<td>
										<b>{lot.grade}</b>, {name}
										<span className="note block">{detail}</span>
									</td>
									<td>
										<label className="sr-only" htmlFor={id}>
											Code of the lot {lot.grade}, {name}
										</label>
										<input
											className="input max-w-48"
											id={id}
											name={`code-${productId}-${lot.grade}`}
											maxLength={20}
											placeholder={proposedCodes[index]}
											autoComplete="off"
											defaultValue={typed[`code-${productId}-${lot.grade}`]}
											aria-invalid={error ? true : undefined}
											aria-describedby={error ? `${id}-error` : undefined}
										/>
										{error && (
											<span className="field-error" id={`${id}-error`}>
												{error}
											</span>
										)}
									</td>
									<td className="num fig pr-4! desk:pr-8!">{lot.pieces}</td>
								</tr>
							)
						}),
					)}
				</tbody>
				<tfoot>
					<tr>
						<td colSpan={2}>
							<b>Off the hives</b>
						</td>
						<td className="num fig pr-4! desk:pr-8!">
							<b>{pieces}</b>
						</td>
					</tr>
				</tfoot>
			</table>
			<div className="grid gap-3 px-4 py-4 desk:px-8">
				{products.map(({ productId, name, lots, moistureTenths, pfundTenths, flora, bestBeforeOn }) => (
					<div key={productId}>
						{lots.length === 0 && (
							<p className="short">
								Nothing is written down of {name}: its supers would come off with nothing in them.
							</p>
						)}
						<p>
							{name}: best before {fullDay(bestBeforeOn)}
							{flora && `, ${flora}`}
							{pfundTenths !== null && `, colour ${colourByPfund(pfundTenths)}`}
							{moistureTenths !== null && `, ${(moistureTenths / 10).toFixed(1)} % of water`}.
						</p>
						<MoistureWords moistureTenths={moistureTenths} />
					</div>
				))}
				<p className="note">
					A field left empty gives the code that is shown in it, or the next free one by your pattern. The lots go into
					the cold room and are held until they are frozen and weighed.
				</p>
				<div className="flex flex-wrap gap-3">
					<Button variant="primary" size="big" name="intent" value="bring-in">
						Bring {pieces} pieces in
					</Button>
					<Button name="intent" value="count">
						Change the count
					</Button>
				</div>
			</div>
		</Form>
	)
}
