import { useEffect } from "react"

/**
 * Y, with the focus anywhere in a group, presses that group's button that confirms all that can be met. It does nothing
 * outside a group, in a field, or with another key held, so that no letter typed elsewhere settles anything.
 */
export function useConfirmKey(): void {
	useEffect(() => {
		const press = (event: KeyboardEvent) => {
			const { target } = event
			if (event.key.toLowerCase() !== "y" || event.ctrlKey || event.metaKey || event.altKey || event.repeat) return
			if (!(target instanceof HTMLElement) || target.matches("input:not([type=hidden]), textarea, select")) return
			const button = target.closest(".ledger-group")?.querySelector<HTMLButtonElement>("button[value=confirm-whole]")
			if (!button || button.disabled) return
			event.preventDefault()
			button.form?.requestSubmit(button)
		}
		document.addEventListener("keydown", press)
		return () => document.removeEventListener("keydown", press)
	}, [])
}
