import { useEffect } from "react"

/** Sets `data-hydrated` on the html element once the script has taken over, for what must wait until then. */
export function useHydrated(): void {
	useEffect(() => {
		document.documentElement.dataset.hydrated = ""
	}, [])
}
