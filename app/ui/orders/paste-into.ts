import { clipboardCells, plainCases, readColumns, type UnmatchedRow } from "~/domain/orders/read-columns"
import { casesName, type SheetProduct } from "./price-sheet"
import { fieldsOf } from "./use-sheet-keys"

/**
 * Fills the sheet from what a spreadsheet has copied: one column downward from the field pasted into, several into the rows
 * that they name. Answers the rows that name no product. Loaded at the first paste: few sheets ever see one.
 */
export function pasteInto(
	form: HTMLFormElement,
	paste: { text: string; from: HTMLInputElement | null; products: readonly SheetProduct[] },
): UnmatchedRow[] {
	const { text, from, products } = paste
	const cells = clipboardCells(text)
	if (from) {
		fillDown(form, from, cells)
		return []
	}
	const { cases, unmatched } = readColumns(cells, products)
	for (const [productId, count] of Object.entries(cases)) {
		const field = form.elements.namedItem(casesName(productId))
		if (!(field instanceof HTMLInputElement)) continue
		// Also one of which none is to be had: it is asked, and answered with what can be done.
		field.disabled = false
		field.value = count
	}
	return unmatched
}

function fillDown(form: HTMLFormElement, from: HTMLInputElement, cells: readonly string[][]): void {
	const fields = fieldsOf(form)
	const start = fields.indexOf(from)
	const counts = cells.map(([cell = ""]) => plainCases(cell))
	// A spreadsheet ends what it copies with a line of nothing.
	const isLast = counts.length > 1 && counts.at(-1) === ""
	for (const [index, count] of (isLast ? counts.slice(0, -1) : counts).entries()) {
		const field = fields[start + index]
		if (field) field.value = count
	}
}
