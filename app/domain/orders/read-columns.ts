/** A row of a list that names no product of the sheet; `row` counts from 1 as a spreadsheet does. */
export type UnmatchedRow = { row: number; code: string; cases: string }

/** What a list says about a sheet: cases as to be typed, by product id, and the rows that name no product. */
type ReadColumns = { cases: Record<string, string>; unmatched: UnmatchedRow[] }

type Product = { productId: string; code: string }

/** The surest first: where one column says "Code", another that says "Product" holds names. */
const CODE_HEADS = [/^(?:product |item )?(?:code|no\.?|number)$/i, /^(?:item|product)$/i]
const CASES_HEADS = [/^cases?$/i, /^(?:quantity|qty|order(?:ed)?)\.?$/i]
const UNITS = /\s*(?:cases?|cs|ctns?|cartons?|boxes|box)\.?$/i
const THOUSANDS = /^\d{1,3}(?:[,.'’\s\u00a0\u2009\u202f]\d{3})+$/

/**
 * A count of cases as a spreadsheet shows it, made plain: "3 cases" and "3 cs" are "3", "1,200" is "1200", "4.0" is "4",
 * and dashes stand for none. What is no count comes back as it was, for the field to say what is wrong with it.
 */
export function plainCases(text: string): string {
	const typed = text.trim()
	const bare = typed.replace(UNITS, "").trim()
	if (/^[-–—]+$/.test(bare)) return ""
	if (THOUSANDS.test(bare)) return bare.replaceAll(/\D/g, "")
	if (/^\d+[.,]0{1,2}$/.test(bare)) return bare.replace(/[.,]0+$/, "")
	return /^\d+$/.test(bare) ? bare : typed
}

/** The cells of what a spreadsheet puts on the clipboard: rows by lines, columns by tabs, or else by semicolons or wide gaps. */
export function clipboardCells(text: string): string[][] {
	const lines = text.replaceAll("\r\n", "\n").replaceAll("\r", "\n").split("\n")
	const gap = text.includes("\t") ? "\t" : text.includes(";") ? ";" : / {2,}/
	return lines.map((line) => (typeof gap === "string" ? line : line.trim()).split(gap).map((cell) => cell.trim()))
}

const bareCode = (code: string) =>
	code
		.trim()
		.replace(/^(?:no\.?|#)\s*/i, "")
		.toLowerCase()

function findProduct(products: readonly Product[], code: string): Product | undefined {
	const wanted = bareCode(code)
	const unpadded = (text: string) => text.replace(/^0+(?=\d)/, "")
	return (
		products.find((product) => bareCode(product.code) === wanted) ??
		products.find((product) => unpadded(bareCode(product.code)) === unpadded(wanted))
	)
}

/** Which columns hold code and cases, and whether the first row only says so. Without a head, the first and the second. */
function findColumns(first: readonly string[], products: readonly Product[]) {
	const findHead = (heads: readonly RegExp[]) =>
		heads.map((head) => first.findIndex((cell) => head.test(cell))).find((index) => index >= 0)
	const [code, cases] = [findHead(CODE_HEADS), findHead(CASES_HEADS)]
	if (code !== undefined && cases !== undefined) return { code, cases, isHead: true }
	const isHead = !/\d/.test(first[1] ?? "") && (first[1] ?? "") !== "" && !findProduct(products, first[0] ?? "")
	return { code: 0, cases: 1, isHead }
}

/**
 * Matches a list of product codes and cases with the products of a sheet. A head is found by its words; rows without a
 * count are left out; rows of one product are added up where both are counts, and else the later one counts. A code
 * matches whatever its case, with or without leading zeros and "No.". This product's own rule.
 */
export function readColumns(cells: readonly (readonly string[])[], products: readonly Product[]): ReadColumns {
	const rows = cells
		.map((row, index) => ({ row: index + 1, cells: row }))
		.filter((row) => row.cells.some((cell) => cell.trim()))
	const columns = findColumns(rows[0]?.cells.map((cell) => cell.trim()) ?? [], products)
	const found: ReadColumns = { cases: {}, unmatched: [] }
	for (const { row, cells: rowCells } of columns.isHead ? rows.slice(1) : rows) {
		const code = rowCells[columns.code]?.trim() ?? ""
		const cases = plainCases(rowCells[columns.cases] ?? "")
		if (cases === "") continue
		const product = findProduct(products, code)
		if (product) found.cases[product.productId] = added(found.cases[product.productId], cases)
		else found.unmatched.push({ row, code, cases })
	}
	return found
}

/** Two counts for one product, added up; what is no count is not guessed at. */
export function added(before: string | undefined, more: string): string {
	const isCount = (text: string) => /^\d{1,6}$/.test(text)
	return before !== undefined && isCount(before) && isCount(more) ? String(Number(before) + Number(more)) : more
}
