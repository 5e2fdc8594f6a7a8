import { useEffect } from "react"
import { useFetcher } from "react-router"

/**
 * Tells the page's action once that a person has the page in front of them: not while a browser prepares it unseen, and
 * not for what only fetches addresses, since that runs no script. Where no script runs, the answer tells it.
 */
export function useOpened(isThere: boolean): void {
	const { submit } = useFetcher()
	useEffect(() => {
		if (!isThere) return
		let isTold = false
		const tell = () => {
			if (isTold || document.visibilityState !== "visible") return
			isTold = true
			submit({ intent: "opened" }, { method: "post", defaultShouldRevalidate: false })
		}
		tell()
		document.addEventListener("visibilitychange", tell)
		return () => document.removeEventListener("visibilitychange", tell)
	}, [isThere, submit])
}
