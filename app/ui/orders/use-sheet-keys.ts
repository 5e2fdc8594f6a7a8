import { type KeyboardEvent, type RefObject, useEffect } from "react"
import { casesName, leastName, productOfField } from "./price-sheet"

/** What a letter key does to a row: answers the new count of cases, or null to leave it. */
export type RowKeys = Readonly<Record<string, (productId: string) => number | null>>

/** The fields of a sheet, from the first row down. */
export function fieldsOf(form: HTMLFormElement): HTMLInputElement[] {
	return [...form.querySelectorAll<HTMLInputElement>(`input[name^="${casesName("")}"]:not(:disabled)`)]
}

const fieldNamed = (form: HTMLFormElement, name: string) => {
	const field = form.elements.namedItem(name)
	return field instanceof HTMLInputElement ? field : null
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
 * The keys of the order sheet: up, down and Enter walk the fields, Ctrl Enter sends, M opens the least of a row, and
 * `rowKeys` names letters that change a row. Without a script none of this is missed: Tab walks, and Enter sends.
 */
export function useSheetKeys(
	form: RefObject<HTMLFormElement | null>,
	{ rowKeys, openLeast }: { rowKeys: RowKeys; openLeast: (productId: string) => void },
) {
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
		if (!(field instanceof HTMLInputElement) || event.ctrlKey || event.metaKey || event.altKey) return
		if (field.name.startsWith(leastName(""))) return leaveLeast(event, element, field)
		const productId = productOfField(field.name)
		if (productId === null) return
		if (walk(event, element, field)) return
		if (event.key.toLowerCase() === "m") {
			event.preventDefault()
			openLeast(productId)
			return
		}
		const change = rowKeys[event.key.toLowerCase()]
		if (!change) return
		event.preventDefault()
		const cases = change(productId)
		if (cases !== null) write(field, String(cases))
	}
}

function walk(event: KeyboardEvent, form: HTMLFormElement, field: HTMLInputElement): boolean {
	const step = event.key === "ArrowUp" ? -1 : event.key === "ArrowDown" || event.key === "Enter" ? 1 : 0
	if (step === 0) return false
	event.preventDefault()
	const fields = fieldsOf(form)
	fields[fields.indexOf(field) + step]?.focus()
	return true
}

/** From the least, Enter and Escape go back to the cases of the row, the arrows to the rows beside it. */
function leaveLeast(event: KeyboardEvent, form: HTMLFormElement, field: HTMLInputElement): void {
	if (!["Enter", "Escape", "ArrowUp", "ArrowDown"].includes(event.key)) return
	event.preventDefault()
	const cases = fieldNamed(form, casesName(field.name.slice(leastName("").length)))
	if (!cases) return
	if (event.key === "Enter" || event.key === "Escape") cases.focus()
	else walk(event, form, cases)
}
