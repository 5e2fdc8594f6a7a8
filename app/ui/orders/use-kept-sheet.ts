import { type RefObject, useCallback, useEffect, useRef } from "react"
import { useFetcher } from "react-router"

/** So long after the last key a sheet is kept. */
const REST_MS = 1200

/**
 * Keeps a half-filled sheet with the store's book a moment after typing stops, and at once when the page is left. Answers
 * what to call at each change, what to call when the sheet is sent, and how the keeping stands.
 */
export function useKeptSheet(form: RefObject<HTMLFormElement | null>, { isOn, path }: { isOn: boolean; path: string }) {
	const fetcher = useFetcher()
	const timer = useRef<number | undefined>(undefined)
	const submit = useRef(fetcher.submit)
	submit.current = fetcher.submit

	const fields = useCallback(() => {
		const body = new URLSearchParams()
		for (const [name, value] of form.current ? new FormData(form.current) : []) {
			if (typeof value === "string" && /^(?:cases-|least-|poNumber$|note$|idempotencyKey$)/.test(name))
				body.append(name, value)
		}
		body.set("intent", "keep-quietly")
		return body
	}, [form])

	const forget = useCallback(() => {
		window.clearTimeout(timer.current)
		timer.current = undefined
	}, [])

	const changed = useCallback(() => {
		if (!isOn) return
		forget()
		timer.current = window.setTimeout(() => {
			timer.current = undefined
			void submit.current(fields(), { method: "post", action: path })
		}, REST_MS)
	}, [isOn, path, fields, forget])

	useEffect(() => {
		const leave = () => {
			if (timer.current === undefined) return
			const body = fields()
			forget()
			navigator.sendBeacon(`${path}.data`, body)
		}
		const hide = () => document.visibilityState === "hidden" && leave()
		window.addEventListener("pagehide", leave)
		document.addEventListener("visibilitychange", hide)
		return () => {
			window.removeEventListener("pagehide", leave)
			document.removeEventListener("visibilitychange", hide)
			forget()
		}
	}, [path, fields, forget])

	const state = fetcher.state !== "idle" ? ("keeping" as const) : fetcher.data === undefined ? null : ("kept" as const)
	return { changed, forget, state }
}
