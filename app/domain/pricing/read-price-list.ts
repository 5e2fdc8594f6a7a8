import type { Day } from "../calendar"
import {
	type BookProduct,
	comparePrice,
	mayBeginOn,
	type NewPrice,
	type PriceBook,
	type PriceChange,
} from "./compare-prices"
import { readCents, readDay, readLeastCases } from "./read-figures"

/** A row that was not understood, as it stands in the file, and why; `row` counts from 1 as a spreadsheet does. */
export type OddRow = { row: number; text: string; why: string }

/** Every row of an uploaded list: what it would change, or why it says nothing. */
export type PricePreview = { changes: (PriceChange & { row: number })[]; odd: OddRow[] }

const COLUMNS = {
	code: /^(?:code|product(?: code)?|item|no\.?|number)$/i,
	tier: /^(?:tier|price tier|list|price list)$/i,
	minCases: /^(?:min(?:\.|imum)? ?cases|from(?: cases)?|cases from|break|min)$/i,
	casePrice: /^(?:case price|price(?: per| a)? case|a case|case|price)$/i,
	poundPrice: /^(?:price(?: per| a)? (?:lb|pound)|per (?:lb|pound)|lb price|a (?:lb|pound))\.?$/i,
	validFrom: /^(?:valid from|from day|starts?(?: on)?|begins|date|day)$/i,
}
type Column = keyof typeof COLUMNS
type Cells = Record<Column, string>

/** Says that a row is not understood, in one sentence for the person who sent it. */
class Odd extends Error {}

function findColumns(head: readonly string[]): Partial<Record<Column, number>> {
	const entries = Object.entries(COLUMNS).map(([name, words]) => [
		name,
		head.findIndex((cell) => words.test(cell.trim())),
	])
	return Object.fromEntries(entries.filter(([, index]) => index !== -1))
}

const plain = (text: string) => text.trim().toLowerCase()

function priceOf(cells: Cells, product: BookProduct): number {
	const [right, other, words] =
		product.pricedBy === "weight"
			? [cells.poundPrice, cells.casePrice, "It is priced by weight: write a price per lb, and none for a case."]
			: [cells.casePrice, cells.poundPrice, "It is priced by the case: write a case price, and none per lb."]
	if (right.trim() === "" || other.trim() !== "") throw new Odd(words)
	const cents = readCents(right)
	if (cents === null) throw new Odd(`“${right.trim().slice(0, 40)}” is not a price.`)
	return cents
}

function readRow(cells: Cells, book: PriceBook, today: Day): NewPrice {
	const product = book.products.find(({ code }) => plain(code) === plain(cells.code))
	if (!product) throw new Odd(`No product has the code “${cells.code.trim().slice(0, 40)}”.`)
	const tier = book.tiers.find(({ name }) => plain(name) === plain(cells.tier))
	if (!tier) throw new Odd(`No price tier is named “${cells.tier.trim().slice(0, 80)}”.`)
	const minCases = cells.minCases.trim() === "" ? 1 : readLeastCases(cells.minCases)
	if (minCases === null)
		throw new Odd(`“${cells.minCases.trim().slice(0, 40)}” is not a number of cases from 1 to 999.`)
	const cents = priceOf(cells, product)
	const validFrom = cells.validFrom.trim() === "" ? today : readDay(cells.validFrom)
	if (validFrom === null) throw new Odd(`“${cells.validFrom.trim().slice(0, 40)}” is not a day.`)
	if (!mayBeginOn(validFrom, today)) throw new Odd("It begins before today, and what was in force is not changed.")
	return { productId: product.id, tierId: tier.id, minCases, cents, validFrom }
}

/**
 * Reads a price list and compares each of its rows with the prices that hold: what is new, changed or unchanged, and which
 * rows are not understood, each with its reason. The first row names the columns: code and tier, the case price or the
 * price per lb, and if wanted the least cases (else 1) and the day from which it holds (else today). Of two rows for one
 * price on one day the second is not understood. Null where the head does not name the columns. This product's own rule.
 */
export function readPriceList(cells: readonly (readonly string[])[], book: PriceBook, today: Day): PricePreview | null {
	const [head = [], ...rows] = cells
	const columns = findColumns(head)
	const hasPrice = columns.casePrice !== undefined || columns.poundPrice !== undefined
	if (columns.code === undefined || columns.tier === undefined || !hasPrice) return null
	const preview: PricePreview = { changes: [], odd: [] }
	const seen = new Set<string>()
	for (const [index, row] of rows.entries()) {
		if (row.every((cell) => cell.trim() === "")) continue
		const names = Object.keys(COLUMNS) as Column[]
		const named = Object.fromEntries(names.map((name) => [name, row[columns[name] ?? -1] ?? ""])) as Cells
		try {
			const price = readRow(named, book, today)
			const key = [price.productId, price.tierId, price.minCases, price.validFrom].join(" ")
			if (seen.has(key)) throw new Odd("The same price stands further up in the list.")
			seen.add(key)
			preview.changes.push({ row: index + 2, ...comparePrice(price, book) })
		} catch (error) {
			if (!(error instanceof Odd)) throw error
			preview.odd.push({ row: index + 2, text: row.join(" | ").slice(0, 160), why: error.message })
		}
	}
	return preview
}
