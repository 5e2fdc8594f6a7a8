import type { ClipboardEvent, RefObject } from "react"
import type { UnmatchedRow } from "~/domain/orders/read-columns"
import { productOfField, type SheetProduct } from "./price-sheet"

/** Cells beside one another, as `clipboardCells` takes them apart. */
const COLUMNS = /[\t;]|\S {2,}\S/

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
		const isOneColumn = !COLUMNS.test(text)
		if (isOneColumn && !isCases) return
		// Several words with a tab between them belong into a note as they are.
		if (!isOneColumn && !isCases && target?.type === "text" && !text.includes("\n")) return
		event.preventDefault()
		const from = isOneColumn ? target : null
		import("./paste-into").then(
			({ pasteInto }) => onFilled(pasteInto(element, { text, from, products })),
			// Without signal it is pasted as it is.
			() => target?.setRangeText(text),
		)
	}
}
