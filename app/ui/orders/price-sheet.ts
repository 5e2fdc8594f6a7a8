import type { Day } from "~/domain/calendar"
import {
	type CaseBreak,
	type DeliveryTerms,
	type OrderPrice,
	type PricedLine,
	priceOrder,
} from "~/domain/pricing/price-order"
import { parseCases } from "~/domain/quantity"

const FIELD = "cases-"

/** The name of a product's field for cases. */
export const casesName = (productId: string) => `${FIELD}${productId}`

/** The product that a field of that name is for; null for any other field. */
export const productOfField = (name: string) => (name.startsWith(FIELD) ? name.slice(FIELD.length) : null)

/** What a strip shows for the day, in whole cases; `freeCases` is all that can be promised. */
export type SheetStrip = {
	free: number
	held: number
	heldUntil: Day | null
	expected: number
	expectedOn: Day | null
	next: { on: Day; quantity: number } | null
	freeCases: number
}

/** One product of the order sheet, as the store buys it. */
export type SheetProduct = {
	productId: string
	code: string
	name: string
	detail: string
	pieceNetGrams: number
	piecesPerCase: number
	breakFamily: string
	breaks: CaseBreak[]
	strip: SheetStrip
	toShareCases: number
	lastCases: number
	orderedCases: number
	/** False when there is no supply at all by that day, so that asking is of no use. */
	mayAsk: boolean
}

/** A row with what was typed in it. `cases` is 0 where nothing, or nothing that can be read, was typed. */
export type PricedRow = {
	product: SheetProduct
	cases: number
	/** More than is free: it stays out of the sure total, and is sent only when it is to be kept. */
	isBeyondFree: boolean
	/** Null where no case is asked. */
	line: PricedLine | null
}

export type PricedSheet = { rows: PricedRow[]; price: OrderPrice }

/**
 * Prices what is typed on the sheet, by product id, with the rule that the server places the order by. What cannot be
 * read as cases counts as none: the field says what is wrong with it once it is sent.
 */
export function priceSheet(
	products: readonly SheetProduct[],
	typed: Readonly<Record<string, string>>,
	terms: DeliveryTerms,
): PricedSheet {
	const asked = products.map((product) => {
		const read = parseCases(typed[product.productId] ?? "")
		const cases = read.ok ? read.cases : 0
		return { product, cases, isBeyondFree: cases > product.strip.freeCases }
	})
	const price = priceOrder({
		lines: asked
			.filter((row) => row.cases > 0)
			.map(({ product, cases, isBeyondFree }) => ({ ...product, cases, toBeSharedOut: isBeyondFree })),
		terms,
	})
	const lines = new Map(price.lines.map((line) => [line.productId, line]))
	return { rows: asked.map((row) => ({ ...row, line: lines.get(row.product.productId) ?? null })), price }
}

/** A column of the price list: from how many cases on, and its head in two lines. */
export type BreakColumn = { minCases: number; head: readonly [string, string] }

/** The columns that hold the breaks of all products: "1 or 2 cases", "3 to 5 cases", "6 or more". */
export function breakColumns(products: readonly { breaks: readonly CaseBreak[] }[]): BreakColumn[] {
	const steps = [...new Set(products.flatMap(({ breaks }) => breaks.map((step) => step.minCases)))].toSorted(
		(a, b) => a - b,
	)
	return steps.map((minCases, index) => {
		const next = steps[index + 1]
		const last = next === undefined ? undefined : next - 1
		if (last === undefined)
			return { minCases, head: minCases === 1 ? ["Price", "of a case"] : [`${minCases} or`, "more"] }
		if (last === minCases) return { minCases, head: [`${minCases}`, minCases === 1 ? "case" : "cases"] }
		return { minCases, head: [last === minCases + 1 ? `${minCases} or ${last}` : `${minCases} to ${last}`, "cases"] }
	})
}

/** What a case costs in a column: the break of the product that is in force from that many cases. */
export function priceInColumn(breaks: readonly CaseBreak[], column: BreakColumn): number {
	const inForce = breaks.findLast((step) => step.minCases <= column.minCases) ?? breaks[0]
	return inForce?.caseCents ?? 0
}

/** The column in force for a row: that of its break, or of the first break where it asks for nothing. */
export function columnInForce(columns: readonly BreakColumn[], { product, line }: PricedRow): number {
	const inForce = product.breaks[line?.breakIndex ?? 0]?.minCases ?? 1
	return Math.max(
		0,
		columns.findLastIndex((column) => column.minCases <= inForce),
	)
}
