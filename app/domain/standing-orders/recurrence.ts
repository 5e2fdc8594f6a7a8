import { RRuleTemporal } from "rrule-temporal"
import { addDays, type Day } from "~/domain/calendar"

/** The first stretch of days that is searched; each further one is twice as long. */
const FIRST_STRETCH_DAYS = 400
/** A rule without a date for this long is taken to have ended. */
const LONGEST_GAP_DAYS = 30 * 366

const compact = (day: Day) => day.replaceAll("-", "")
const midnight = (day: Day) => new Date(`${day}T00:00:00Z`)

/**
 * The days on which an iCalendar rule falls, in order: at most `count` of them, on or after `from` and on or before
 * `until` where given. The rule's own COUNT is counted from `startsOn`. A rule about days alone needs no clock; `at` gives
 * the wall-clock start where UNTIL is an instant, which then cuts within the day. A rule that has no date for thirty years
 * (30 February) is taken to have ended. Throws on a malformed rule. Source: RFC 5545, 3.3.10 and 3.8.5.3.
 */
export function occurrences(search: {
	rule: string
	startsOn: Day
	count: number
	from?: Day
	until?: Day
	at?: { time: string; zone: string }
}): Day[] {
	const { startsOn, count, until, at } = search
	const from = search.from !== undefined && search.from > startsOn ? search.from : startsOn
	const start = at
		? `DTSTART;TZID=${at.zone}:${compact(startsOn)}T${at.time.replaceAll(":", "").padEnd(6, "0")}`
		: `DTSTART;VALUE=DATE:${compact(startsOn)}`
	const rule = new RRuleTemporal({ rruleString: `${start}\nRRULE:${search.rule}` })

	const days: Day[] = []
	// A day in any zone begins within a day of midnight UTC. The library's `between` is some twenty times as quick as
	// stepping from date to date, so time is searched in stretches.
	let stretchFrom = addDays(from, -1)
	let stretchDays = FIRST_STRETCH_DAYS
	let lastFound = from
	while (days.length < count && stretchFrom <= addDays(lastFound, LONGEST_GAP_DAYS)) {
		if (until !== undefined && stretchFrom > addDays(until, 1)) break
		const next = addDays(stretchFrom, stretchDays)
		for (const date of rule.between(midnight(stretchFrom), new Date(midnight(next).getTime() - 1), true)) {
			// Days cross from the library as text, since it brings a Temporal of its own.
			const day = date.toString().slice(0, 10)
			if (days.length === count || (until !== undefined && day > until)) return days
			if (day >= from) days.push(day)
		}
		lastFound = days.at(-1) ?? lastFound
		stretchFrom = next
		stretchDays *= 2
	}
	return days
}

/** `occurrences` with a memory, for many standing orders at once: most follow a few rules, and each is searched once. */
export function rememberedOccurrences(): typeof occurrences {
	const known = new Map<string, Day[]>()
	return (search) => {
		const key = JSON.stringify(search)
		const days = known.get(key) ?? occurrences(search)
		known.set(key, days)
		return days
	}
}
