import { formatMoney } from "~/domain/money"
import type { DeliveryTerms } from "~/domain/pricing/price-order"
import { type PricedRow, type PricedSheet, priceSheet, type SheetProduct } from "./price-sheet"

type RowNoteProps = {
	row: PricedRow
	sheet: PricedSheet
	products: readonly SheetProduct[]
	typed: Readonly<Record<string, string>>
	terms: DeliveryTerms
	/** Whether the buyer has said to keep what is more than free. */
	isKept: boolean
	/** The field's error says the same already; the box to keep it stays. */
	hasError: boolean
}

/** The reason or the hint beside a row, one at most: to be shared out, the next break, or what was had last time. */
export function RowNote({ row, sheet, products, typed, terms, isKept, hasError }: RowNoteProps) {
	const { product, cases, line } = row
	if (row.isBeyondFree) {
		const free = product.strip.freeCases
		const words =
			free === 0 ? (
				<>
					<b>None is free.</b> Keep {cases} and it is shared out.
				</>
			) : (
				<>
					<b>{free} are free.</b> Ask for {free}, or keep {cases} and it is shared out.
				</>
			)
		return (
			<>
				{!hasError && words}
				<label className="mt-1 flex min-h-6 items-center gap-2 font-sans text-table not-italic text-ink">
					<input
						type="checkbox"
						className="size-5 accent-clover"
						name={`keep-${product.productId}`}
						value="yes"
						defaultChecked={isKept}
					/>
					Keep {cases}
				</label>
			</>
		)
	}
	const next = line?.nextBreak
	// One case short of a break is worth a word; further off, the columns say it.
	if (next?.addCases === 1) {
		const more = priceSheet(products, { ...typed, [product.productId]: String(cases + 1) }, terms)
		const passes = sheet.price.minimumShortCents > 0 && more.price.minimumShortCents === 0
		return (
			<>
				One more case makes each <b>{formatMoney(next.caseCents)}</b>:{" "}
				{formatMoney(Math.max(0, more.price.upToCents - sheet.price.upToCents))} more
				{passes && `, past the ${formatMoney(terms.minimumCents)} minimum`}.
			</>
		)
	}
	if (cases === 0 && product.lastCases > 0 && product.mayAsk && sheet.price.cases > 0) {
		return <>You had {product.lastCases} last time.</>
	}
	return null
}
