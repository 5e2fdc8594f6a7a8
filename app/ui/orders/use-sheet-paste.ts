import type { ClipboardEvent, RefObject } from "react"
import { clipboardCells, plainCases, readColumns, type UnmatchedRow } from "~/domain/orders/read-columns"
import { casesName, productOfField, type SheetProduct } from "./price-sheet"
import { fieldsOf } from "./use-sheet-keys"

/**
 * Takes what a spreadsheet has copied, pasted anywhere on the sheet: two columns fill the rows they name; one column of
 * counts fills the fields from the one pasted into downward. Anything else is pasted as ever.
 */
export function useSheetPaste(
	form: RefObject<HTMLFormElement | null>,
	{ products, onFilled }: { products: readonly SheetProduct[]; onFilled: (unmatched: UnmatchedRow[]) => void },
) {
	return (event: ClipboardEvent<HTMLFormElement>) => {
		const element = form.current
		const text = event.clipboardData.getData("text/plain")
		if (!element || text.trim() === "") return
		const target = event.target instanceof HTMLInputElement ? event.target : null
		const isCases = target !== null && productOfField(target.name) !== null
		const cells = clipboardCells(text)
		if (cells.every((row) => row.length < 2)) {
			if (!isCases || !target) return
			event.preventDefault()
			fillDown(element, target, cells)
			return onFilled([])
		}
		// Several words with a tab between them belong into a note as they are.
		if (!isCases && target?.type === "text" && !text.includes("\n")) return
		event.preventDefault()
		const { cases, unmatched } = readColumns(cells, products)
		for (const [productId, count] of Object.entries(cases)) {
			const field = element.elements.namedItem(casesName(productId))
			if (!(field instanceof HTMLInputElement)) continue
			// Also one of which none is to be had: it is asked, and answered with what can be done.
			field.disabled = false
			field.value = count
		}
		onFilled(unmatched)
	}
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
