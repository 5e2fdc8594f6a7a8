import { fullDay } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import type { PriceBook, PriceChange } from "~/domain/pricing/compare-prices"
import type { OddRow } from "~/domain/pricing/read-price-list"

const KIND_WORDS = { new: "new", changed: "changed", unchanged: "as it is" } as const

type Change = PriceChange & { row: number }
type Book = Pick<PriceBook, "products" | "tiers">

/** "+4.00", "−1.50", or nothing where there is no old price. */
function differenceWords({ oldCents, cents }: Change): string {
	if (oldCents === null || oldCents === cents) return ""
	return `${cents > oldCents ? "+" : "−"}${plainMoney(Math.abs(cents - oldCents))}`
}

/** What a list would change, one row for each price: what holds, what it would be, and the difference. */
export function PricePreviewTable({ changes, products, tiers }: { changes: readonly Change[] } & Book) {
	return (
		// biome-ignore lint/a11y/noNoninteractiveTabindex: a table wider than the screen is scrolled by keyboard too
		<section className="overflow-x-auto" aria-label="What the list would change" tabIndex={0}>
			<table className="sheet-table price-preview">
				<thead>
					<tr>
						<th scope="col">Row</th>
						<th scope="col">Product</th>
						<th scope="col">Tier</th>
						<th scope="col">From</th>
						<th scope="col" className="num">
							Now
						</th>
						<th scope="col" className="num">
							New
						</th>
						<th scope="col" className="num">
							Difference
						</th>
						<th scope="col">Which is</th>
					</tr>
				</thead>
				<tbody>
					{changes.map((change) => {
						const product = products.find(({ id }) => id === change.productId)
						return (
							<tr key={change.row} className={change.kind === "unchanged" ? "as-it-is" : undefined}>
								<td className="fig text-ink-faint">{change.row}</td>
								<td>
									<span className="fig text-ink-faint">{product?.code}</span>{" "}
									<span className="name text-body!">{product?.name}</span>
								</td>
								<td>{tiers.find(({ id }) => id === change.tierId)?.name}</td>
								<td>
									{fullDay(change.validFrom)}
									{change.minCases > 1 && <span className="note block">from {change.minCases} cases</span>}
								</td>
								<td className="money">{change.oldCents === null ? "none" : plainMoney(change.oldCents)}</td>
								<td className="money">
									{plainMoney(change.cents)}
									{product?.pricedBy === "weight" && <span className="note block">a lb</span>}
								</td>
								<td className="money">{differenceWords(change)}</td>
								<td>{KIND_WORDS[change.kind]}</td>
							</tr>
						)
					})}
				</tbody>
			</table>
		</section>
	)
}

/** Rows that were not understood, each with its reason; they change nothing. */
export function OddRows({ odd }: { odd: readonly OddRow[] }) {
	if (odd.length === 0) return null
	return (
		<section className="sheet-part" aria-labelledby="odd-rows">
			<h2 className="head-italic" id="odd-rows">
				Not understood, so left out
			</h2>
			<ul className="odd-rows">
				{odd.map(({ row, text, why }) => (
					<li key={row}>
						<b>Row {row}.</b> {why} <span className="note block">{text}</span>
					</li>
				))}
			</ul>
		</section>
	)
}
