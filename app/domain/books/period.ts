import { addDays, type Day, endOfMonth, fullDay, monthDay, monthName } from "~/domain/calendar"

/** From a first day to a last, both included. */
export type Period = { from: Day; to: Day }

/** The month of a day. */
export function monthOf(day: Day): Period {
	return { from: `${day.slice(0, 8)}01`, to: endOfMonth(day) }
}

/** The calendar year of a day. */
export function yearOf(day: Day): Period {
	return { from: `${day.slice(0, 4)}-01-01`, to: `${day.slice(0, 4)}-12-31` }
}

/** The months before and after that in which a period begins and ends. */
export function monthsAround({ from, to }: Period): { earlier: Period; later: Period } {
	return { earlier: monthOf(addDays(monthOf(from).from, -1)), later: monthOf(addDays(endOfMonth(to), 1)) }
}

/** "August 2026", "the year 2026", "August 4 to September 2, 2026", "August 4, 2026". */
export function periodWords({ from, to }: Period): string {
	if (from === to) return fullDay(from)
	const [month, year] = [monthOf(from), yearOf(from)]
	if (from === month.from && to === month.to) return `${monthName(Number(from.slice(5, 7)))} ${from.slice(0, 4)}`
	if (from === year.from && to === year.to) return `the year ${from.slice(0, 4)}`
	return `${from.slice(0, 4) === to.slice(0, 4) ? monthDay(from) : fullDay(from)} to ${fullDay(to)}`
}
