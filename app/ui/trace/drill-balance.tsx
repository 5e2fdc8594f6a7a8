import type { LotBalance } from "~/domain/trace/balance"

const COLUMNS = [
	["out", "Sold"],
	["inHand", "In hand"],
	["waste", "Waste"],
	["cutUp", "Cut up"],
	["otherLots", "Other lots"],
	["missing", "Missing"],
] as const satisfies readonly (readonly [keyof LotBalance, string])[]

/** A line for each traced lot: what was harvested, and what it adds up from. */
export function DrillBalance({ lots }: { lots: readonly (LotBalance & { code: string; productName: string })[] }) {
	return (
		<div className="beside-margin overflow-x-auto">
			<table className="sheet-table mb-6">
				<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">The balance, in pieces</caption>
				<thead>
					<tr>
						<th scope="col">Lot</th>
						{COLUMNS.map(([column, words]) => (
							<th key={column} scope="col" className="num">
								{words}
							</th>
						))}
						<th scope="col" className="num pr-4! desk:pr-8!">
							Harvested
						</th>
					</tr>
				</thead>
				<tbody>
					{lots.map((lot) => (
						<tr key={lot.code}>
							<td>
								{lot.code}
								<span className="note block max-desk:hidden">{lot.productName}</span>
							</td>
							{COLUMNS.map(([column]) => (
								<td key={column} className="num fig">
									{lot[column]}
								</td>
							))}
							<td className={`num fig pr-4! desk:pr-8! ${lot.isBalanced ? "" : "short"}`}>
								<b>{lot.harvested}</b>
							</td>
						</tr>
					))}
				</tbody>
			</table>
		</div>
	)
}
