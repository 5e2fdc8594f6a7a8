import { addDays, compareDays, type Day, isDay } from "~/domain/calendar"
import type { StatementRange } from "~/domain/receivables/statement"

/**
 * The days a statement is asked for in the address; without any, from the first of the month two months back until
 * `today`. A last day in the future is today. `error` says what is wrong with them, and the range is then the usual one;
 * `typed` is what stood there.
 */
export function statementRange(
	search: URLSearchParams,
	today: Day,
): { range: StatementRange; error: string | null; typed: StatementRange } {
	const usual = { from: `${addDays(`${today.slice(0, 7)}-01`, -32).slice(0, 7)}-01`, until: today }
	const typed = { from: search.get("from") || usual.from, until: search.get("until") || usual.until }
	if (!isDay(typed.from) || !isDay(typed.until)) {
		return { range: usual, error: "Write both days, such as 2026-08-18.", typed }
	}
	const until = compareDays(typed.until, today) > 0 ? today : typed.until
	if (compareDays(typed.from, until) > 0) {
		return { range: usual, error: "The first day is after the last.", typed }
	}
	return { range: { from: typed.from, until }, error: null, typed: { from: typed.from, until } }
}
