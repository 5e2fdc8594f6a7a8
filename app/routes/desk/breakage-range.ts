import { addDays, type Day, isDay } from "~/domain/calendar"
import type { BrokenBy } from "~/services/breakage/find-where-broken.server"

/** By what broken pieces can be looked at, in the order of the links. */
export const BROKEN_BY: readonly { value: BrokenBy; label: string; head: string }[] = [
	{ value: "lot", label: "By lot", head: "Lot" },
	{ value: "round", label: "By delivery round", head: "Round" },
	{ value: "product", label: "By product", head: "Product" },
]

/** What the address of the page and of its file asks for; without days the quarter of a year up to `today`. */
export function breakageRange(url: URL, today: Day): { by: BrokenBy; from: Day; to: Day; error: string | null } {
	const by = BROKEN_BY.find(({ value }) => value === url.searchParams.get("by"))?.value ?? "lot"
	const from = url.searchParams.get("from") ?? addDays(today, -91)
	const to = url.searchParams.get("to") ?? today
	if (!isDay(from) || !isDay(to)) return { by, from, to, error: "Write both days, such as 2026-08-18." }
	return { by, from, to, error: from > to ? "The first day is after the last." : null }
}
