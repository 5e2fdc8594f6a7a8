import type { Day } from "~/domain/calendar"
import { lineParts } from "~/domain/orders/line-parts"
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

/** The name of a product's field for the least that is of use, and for what to do when less is free than asked. */
export const leastName = (productId: string) => `least-${productId}`
export const keepName = (productId: string) => `keep-${productId}`

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
	/** What it is in the middle of the last few orders. */
	usualCases: number
	orderedCases: number
	/** False when there is no supply at all by that day, so that asking is of no use. */
	mayAsk: boolean
}

/** What a row comes to. Breaks are those of all cases asked; `cents` those of the parts together. */
type RowPrice = Pick<PricedLine, "breakIndex" | "nextBreak"> & { cents: number }

/** A row with what was typed in it. `cases` is 0 where nothing, or nothing that can be read, was typed. */
export type PricedRow = {
	product: SheetProduct
	cases: number
	/** The least that is of use, as it was typed. */
	least: string
	/** What is promised if it is sent now, and what would wait to be shared out. */
	sureCases: number
	sharedCases: number
	/** More is asked than is free: the buyer says what then. */
	isBeyondFree: boolean
	/** Null where no case is asked. */
	line: RowPrice | null
}

export type PricedSheet = { rows: PricedRow[]; price: OrderPrice }

type Typed = Readonly<Record<string, string>>

function readRow(product: SheetProduct, typed: Typed): Omit<PricedRow, "line"> {
	const read = parseCases(typed[casesName(product.productId)] ?? "")
	const cases = read.ok ? read.cases : 0
	const free = Math.max(0, product.strip.freeCases)
	const isBeyondFree = cases > free
	const isFreeOnly = isBeyondFree && typed[keepName(product.productId)] === "free"
	const least = typed[leastName(product.productId)]?.trim() ?? ""
	const sureCases = Math.min(cases, free)
	return { product, cases, least, sureCases, sharedCases: isFreeOnly ? 0 : cases - sureCases, isBeyondFree }
}

/**
 * Prices what is typed on the sheet, by the name of its field, with the rule that the server places the order by. What
 * cannot be read as cases counts as none: the field says what is wrong with it once it is sent. Of a row that asks for
 * more than is free the free part is sure, and the rest to be shared out unless the buyer takes the free part alone.
 */
export function priceSheet(products: readonly SheetProduct[], typed: Typed, terms: DeliveryTerms): PricedSheet {
	const asked = products.map((product) => readRow(product, typed))
	const parts = asked
		.map((row) => ({
			row,
			cases: row.sureCases + row.sharedCases,
			isToShare: row.sharedCases > 0,
			promisedCases: row.sureCases,
		}))
		.filter((line) => line.cases > 0)
		.flatMap((line) => lineParts(line))
	const price = priceOrder({
		lines: parts.map(({ line, ...part }) => ({ ...line.row.product, ...part })),
		terms,
	})
	const lines = new Map<string, RowPrice>()
	for (const { productId, breakIndex, nextBreak, lineCents } of price.lines) {
		lines.set(productId, { breakIndex, nextBreak, cents: (lines.get(productId)?.cents ?? 0) + lineCents })
	}
	return { rows: asked.map((row) => ({ ...row, line: lines.get(row.product.productId) ?? null })), price }
}

/** The rows of `fresh`, each in the place of its like in `before` where it shows the same: such rows need no new drawing. */
export function keepRows(before: readonly PricedRow[], fresh: readonly PricedRow[]): PricedRow[] {
	return fresh.map((row, index) => {
		const old = before[index]
		return old && old.product === row.product && showsSame(old, row) ? old : row
	})
}

function showsSame(a: PricedRow, b: PricedRow): boolean {
	const figures = ({ cases, least, sharedCases, isBeyondFree, line }: PricedRow) =>
		[cases, least, sharedCases, isBeyondFree, line?.cents, line?.breakIndex, line?.nextBreak?.addCases].join(" ")
	return figures(a) === figures(b)
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
