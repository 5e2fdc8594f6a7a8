import { type KeyboardEvent, type RefObject, useEffect } from "react"
import { casesName, productOfField } from "./price-sheet"

/** What a letter key does to a row: answers the new count of cases, or null to leave it. */
export type RowKeys = Readonly<Record<string, (productId: string) => number | null>>

/** The fields of a sheet, from the first row down. */
function fieldsOf(form: HTMLFormElement): HTMLInputElement[] {
	return [...form.querySelectorAll<HTMLInputElement>(`input[name^="${casesName("")}"]:not(:disabled)`)]
}

/**
 * Writes into a field as a hand would: by the browser's own setter, which the input event follows, so that whoever
 * listens to the form hears of it.
 */
function write(field: HTMLInputElement, value: string): void {
	field.value = value
	field.dispatchEvent(new Event("input", { bubbles: true }))
	field.select()
}

/**
 * The keys of the order sheet: up, down and Enter walk the fields, Ctrl Enter sends, and `rowKeys` names letters that
 * change a row. Without a script none of this is missed: Tab walks, and Enter sends.
 */
export function useSheetKeys(form: RefObject<HTMLFormElement | null>, rowKeys: RowKeys) {
	useEffect(() => {
		const isDesk = window.matchMedia("(min-width: 64rem)").matches
		const isFree = document.activeElement === null || document.activeElement === document.body
		if (isDesk && isFree && form.current) fieldsOf(form.current)[0]?.focus({ preventScroll: true })
	}, [form])

	return (event: KeyboardEvent<HTMLFormElement>) => {
		const element = form.current
		if (!element) return
		if (event.key === "Enter" && (event.ctrlKey || event.metaKey)) {
			event.preventDefault()
			element.requestSubmit()
			return
		}
		const field = event.target
		const productId = field instanceof HTMLInputElement ? productOfField(field.name) : null
		if (!(field instanceof HTMLInputElement) || productId === null) return
		if (event.ctrlKey || event.metaKey || event.altKey) return
		const fields = fieldsOf(element)
		const step = event.key === "ArrowUp" ? -1 : event.key === "ArrowDown" || event.key === "Enter" ? 1 : 0
		if (step !== 0) {
			event.preventDefault()
			fields[fields.indexOf(field) + step]?.focus()
			return
		}
		const change = rowKeys[event.key.toLowerCase()]
		if (!change) return
		event.preventDefault()
		const cases = change(productId)
		if (cases !== null) write(field, String(cases))
	}
}
