import { addDays, type Day, isDay } from "~/domain/calendar"

/** The days that records are asked for; without days in the address the year up to `today`. */
export function recordsRange(url: URL, today: Day): { from: Day; to: Day; error: string | null } {
	const from = url.searchParams.get("from") ?? addDays(today, -365)
	const to = url.searchParams.get("to") ?? today
	if (!isDay(from) || !isDay(to)) return { from, to, error: "Write both days, such as 2026-08-18." }
	return { from, to, error: from > to ? "The first day is after the last." : null }
}
