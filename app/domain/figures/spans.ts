import { mondayOf } from "~/domain/books/dated-event"
import type { Period } from "~/domain/books/period"
import { addDays, type Day, daysBetween, endOfMonth, monthName, shortMonthDay } from "~/domain/calendar"

/** Into which spans of time a picture is divided. */
export type Span = "week" | "month" | "year"

/** Weeks up to a year, months up to five, years beyond: so that the picture stays one that can be looked at. */
export function spanFor({ from, to }: Period): Span {
	const days = daysBetween(from, to)
	if (days <= 371) return "week"
	return days <= 5 * 366 ? "month" : "year"
}

/** The first day of the span that a day lies in. */
export function spanStart(day: Day, span: Span): Day {
	if (span === "week") return mondayOf(day)
	return span === "month" ? `${day.slice(0, 8)}01` : `${day.slice(0, 4)}-01-01`
}

/** "Aug 3" for a week, "Aug 2026" for a month, "2026" for a year. */
export function spanWords(start: Day, span: Span): string {
	if (span === "week") return shortMonthDay(start)
	const year = start.slice(0, 4)
	return span === "month" ? `${monthName(Number(start.slice(5, 7))).slice(0, 3)} ${year}` : year
}

/** What was sold in a span, in cents without tax and delivery. */
export type SoldSpan = { startOn: Day; storeCents: number; stallCents: number }

/** From the first span with sales to the last, those between without any put in. */
export function fillSpans(sold: readonly SoldSpan[], span: Span): SoldSpan[] {
	const first = sold.at(0)?.startOn
	const last = sold.at(-1)?.startOn
	if (!first || !last) return []
	const known = new Map(sold.map((one) => [one.startOn, one]))
	const filled: SoldSpan[] = []
	for (let startOn = first; startOn <= last; startOn = following(startOn, span))
		filled.push(known.get(startOn) ?? { startOn, storeCents: 0, stallCents: 0 })
	return filled
}

function following(start: Day, span: Span): Day {
	if (span === "week") return addDays(start, 7)
	return addDays(endOfMonth(span === "month" ? start : `${start.slice(0, 4)}-12-01`), 1)
}
