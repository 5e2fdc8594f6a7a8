import { monthOf, type Period } from "~/domain/books/period"
import { type Day, daysBetween, isDay } from "~/domain/calendar"

/** What the address asks for: the days that hold, what was typed, and what is wrong with it. */
export type AskedPeriod = { period: Period; typed: { from: string; to: string }; error: string | null }

/**
 * The days that the address asks for; without days, or with wrong ones, the `usual`: the month of `today` unless said.
 * More than `mostDays` are refused.
 */
export function askedPeriod(
	url: URL,
	today: Day,
	{ usual = monthOf(today), mostDays }: { usual?: Period; mostDays?: number } = {},
): AskedPeriod {
	const typed = { from: url.searchParams.get("from") ?? usual.from, to: url.searchParams.get("to") ?? usual.to }
	const refused = (error: string) => ({ period: usual, typed, error })
	if (!isDay(typed.from) || !isDay(typed.to) || typed.from < "1900-01-01" || typed.to > "2999-12-31")
		return refused("Write both days, such as 2026-08-18.")
	if (typed.from > typed.to) return refused("The first day is after the last.")
	if (mostDays && daysBetween(typed.from, typed.to) >= mostDays)
		return refused("Choose three years at most. The file takes any days.")
	return { period: typed, typed, error: null }
}
