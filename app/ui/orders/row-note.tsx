import type { ReactNode } from "react"
import { type Day, dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import type { DeliveryTerms } from "~/domain/pricing/price-order"
import { Button } from "~/ui/forms/button"
import { casesName, keepName, type PricedRow, type PricedSheet, priceSheet, type SheetProduct } from "./price-sheet"

type NoteFacts = {
	row: PricedRow
	sheet: PricedSheet
	products: readonly SheetProduct[]
	typed: Readonly<Record<string, string>>
	terms: DeliveryTerms
	/** What the buyer has chosen for a row that asks more than is free. */
	keep: string | undefined
	/** The field's error says the same already; the choice stays. */
	hasError: boolean
	/** Where the same sheet can go for another day, and the days that have what is asked. */
	sheetPath: string
	elsewhere: readonly Day[]
}

/** What stands beside a row; `key` is the same exactly when it reads the same. */
export type RowNote = { key: string; node: ReactNode }

/** The reason or the hint beside a row, one at most: what to do when less is free, the next break, or what was had last time. */
export function rowNote(facts: NoteFacts): RowNote {
	const { row, sheet, products, typed, terms } = facts
	const { product, cases, line } = row
	if (row.isBeyondFree) return shortNote(facts)
	const next = line?.nextBreak
	// One case short of a break is worth a word; further off, the columns say it.
	if (next?.addCases === 1) {
		const more = priceSheet(products, { ...typed, [casesName(product.productId)]: String(cases + 1) }, terms)
		const passes = sheet.price.minimumShortCents > 0 && more.price.minimumShortCents === 0
		const addedCents = Math.max(0, more.price.upToCents - sheet.price.upToCents)
		return {
			key: `next ${next.caseCents} ${addedCents} ${passes}`,
			node: (
				<>
					One more case makes each <b>{formatMoney(next.caseCents)}</b>: {formatMoney(addedCents)} more
					{passes && `, past the ${formatMoney(terms.minimumCents)} minimum`}.
				</>
			),
		}
	}
	const had = cases === 0 && product.mayAsk && sheet.price.cases > 0 ? hadWords(product) : ""
	if (had) return { key: had, node: had }
	return { key: "", node: null }
}

/** What the store had last time, and what is usual where that is something else. */
function hadWords({ lastCases, usualCases }: SheetProduct): string {
	if (lastCases === 0) return usualCases > 0 ? `${usualCases} is usual.` : ""
	const usual = usualCases > 0 && usualCases !== lastCases ? `; ${usualCases} is usual` : ""
	return `You had ${lastCases} last time${usual}.`
}

function shortNote({ row, keep, hasError, sheetPath, elsewhere }: NoteFacts): RowNote {
	const { product, cases, least } = row
	const free = row.sureCases
	const name = keepName(product.productId)
	const choice = (value: "free" | "rest", words: string) => (
		<label className="flex min-h-6 items-center gap-2 font-sans text-table not-italic text-ink">
			<input type="radio" className="size-5 accent-clover" name={name} value={value} defaultChecked={keep === value} />
			{words}
		</label>
	)
	const node = (
		<>
			{!hasError && <b>{free === 0 ? "None is free." : `${free} ${free === 1 ? "is" : "are"} free.`} </b>}
			<fieldset className="mt-1 grid gap-1">
				<legend className="sr-only">
					What to do about {product.name}, {product.detail}
				</legend>
				{choice("free", free === 0 ? "Leave it off" : `Take ${free}`)}
				{choice("rest", free === 0 ? `Wait on the list for ${cases}` : `Take ${free}, wait for ${cases - free} more`)}
			</fieldset>
			{least !== "" && Number(least) > 0 && (
				<span className="block">
					You take <b>{least} at least</b>.
				</span>
			)}
			{elsewhere.map((on) => (
				<Button
					key={on}
					variant="plain"
					size="small"
					className="mt-1 text-left"
					name="intent"
					value="carry"
					formAction={`${sheetPath}/${on}`}
				>
					{dayWords(on)} has {cases}
				</Button>
			))}
		</>
	)
	return { key: ["short", free, cases, keep, least, hasError, ...elsewhere].join(" "), node }
}
