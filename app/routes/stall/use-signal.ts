import { useSyncExternalStore } from "react"

/** Whether the phone has signal, as far as it knows. On the server, and before the page is awake, it has. */
export function useSignal(): boolean {
	return useSyncExternalStore(
		(changed) => {
			window.addEventListener("online", changed)
			window.addEventListener("offline", changed)
			return () => {
				window.removeEventListener("online", changed)
				window.removeEventListener("offline", changed)
			}
		},
		() => navigator.onLine,
		() => true,
	)
}
