import type { ReactNode } from "react"
import { formatMoney } from "~/domain/money"
import type { DeliveryTerms } from "~/domain/pricing/price-order"
import { casesWords } from "~/domain/quantity"
import { labelledTotalWords } from "~/domain/weight"
import { Totals, TotalsRow } from "~/ui/layout/sheet"
import { StockKey } from "~/ui/stock/stock-key"
import type { PricedRow, PricedSheet } from "./price-sheet"

function Key({ children }: { children: ReactNode }) {
	return <kbd className="keycap font-sans">{children}</kbd>
}

/** The keys of the sheet, for those who have a keyboard, and what the cells of the strips mean. */
export function SheetKeys() {
	return (
		<div className="text-note text-ink-soft">
			<ul className="hidden flex-wrap gap-x-4 gap-y-2 desk:flex" aria-label="Keys">
				<li>
					<Key>↑</Key> <Key>↓</Key> row
				</li>
				<li>
					<Key>0</Key> to <Key>999</Key> cases
				</li>
				<li>
					<Key>B</Key> up to next break
				</li>
				<li>
					<Key>L</Key> as last time
				</li>
				<li>
					<Key>M</Key> least you would take
				</li>
				<li>
					<Key>Ctrl</Key> <Key>Enter</Key> send
				</li>
			</ul>
			<div className="desk:mt-3">
				<StockKey
					states={["free", "held", "expected"]}
					words={{ free: "free", held: "held: freezing or to weigh", expected: "expected from the hives" }}
				/>
			</div>
		</div>
	)
}

const weightOf = (rows: readonly PricedRow[], casesOf: (row: PricedRow) => number) =>
	labelledTotalWords(
		rows.map((row) => ({
			labelledGrams: row.product.pieceNetGrams,
			pieces: casesOf(row) * row.product.piecesPerCase,
		})),
	)

/** The sums of the sheet as it is typed: what is sure, what is to be shared out, the way, and the most it can come to. */
export function SheetTotals({ sheet: { rows, price } }: { sheet: PricedSheet }) {
	const asked = rows.filter((row) => row.line !== null)
	const isShared = asked.some((row) => row.sharedCases > 0)
	return (
		<div aria-live="polite">
			<Totals>
				<TotalsRow
					label={isShared ? `${casesWords(price.sureCases)} sure` : casesWords(price.sureCases)}
					note={price.sureCases > 0 ? weightOf(asked, (row) => row.sureCases) : undefined}
					value={formatMoney(price.sureCents)}
					weight="strong"
				/>
				{isShared && (
					<TotalsRow
						label={`${casesWords(price.sharedCases)} to be shared out`}
						note={weightOf(asked, (row) => row.sharedCases)}
						value={`up to ${formatMoney(price.sharedCents)}`}
					/>
				)}
				{price.cases > 0 && (
					<TotalsRow label="Delivery" value={price.deliveryCents === 0 ? "free" : formatMoney(price.deliveryCents)} />
				)}
				<TotalsRow
					label={isShared ? `${casesWords(price.cases)} if all are met` : "To pay"}
					note={isShared ? weightOf(asked, (row) => row.sureCases + row.sharedCases) : undefined}
					value={formatMoney(price.upToCents + price.deliveryCents)}
					weight="sum"
				/>
			</Totals>
		</div>
	)
}

/** How far the sure sum is from the store's minimum and from free delivery; nothing once both are passed. */
export function MinimumNote({ sheet: { price }, terms }: { sheet: PricedSheet; terms: DeliveryTerms }) {
	if (price.cases === 0) return null
	const { minimumShortCents, freeShortCents } = price
	const charge = formatMoney(terms.deliveryChargeCents)
	if (minimumShortCents > 0) {
		return (
			<p className="aside">
				<b>{formatMoney(minimumShortCents)} short</b> of the {formatMoney(terms.minimumCents)} delivery minimum.
				{price.deliveryCents > 0 && ` Below it, delivery is ${charge}.`}
			</p>
		)
	}
	if (freeShortCents !== null && freeShortCents > 0 && price.deliveryCents > 0) {
		return (
			<p className="aside">
				<b>{formatMoney(freeShortCents)} more</b> and delivery is free; below it, {charge}.
			</p>
		)
	}
	return null
}
