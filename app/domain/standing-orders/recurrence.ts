import { RRuleTemporal } from "rrule-temporal"
import type { Day } from "~/domain/calendar"

const compact = (day: Day) => day.replaceAll("-", "")

/**
 * The days on which an iCalendar rule falls, in order: at most `count` of them, on or after `from` and on or before
 * `until` where given. The rule's own COUNT is counted from `startsOn`. A rule about days alone needs no clock; `at` gives
 * the wall-clock start where UNTIL is an instant, which then cuts within the day. Days cross from the library as text,
 * since it brings a Temporal of its own.
 * Throws on a rule that is malformed, or that never falls again (30 February) within the library's search.
 * Source: RFC 5545, 3.3.10 and 3.8.5.3.
 */
export function occurrences(search: {
	rule: string
	startsOn: Day
	count: number
	from?: Day
	until?: Day
	at?: { time: string; zone: string }
}): Day[] {
	const { rule, startsOn, count, from, until, at } = search
	const start = at
		? `DTSTART;TZID=${at.zone}:${compact(startsOn)}T${at.time.replaceAll(":", "").padEnd(6, "0")}`
		: `DTSTART;VALUE=DATE:${compact(startsOn)}`
	const days: Day[] = []
	if (count <= 0) return days
	new RRuleTemporal({ rruleString: `${start}\nRRULE:${rule}`, cache: false }).all((date) => {
		const day = date.toString().slice(0, 10)
		if (until !== undefined && day > until) return false
		if (from === undefined || day >= from) days.push(day)
		return days.length < count
	})
	return days
}
