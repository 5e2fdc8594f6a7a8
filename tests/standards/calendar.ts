import { describe, expect, test } from "vitest"
import { occurrences } from "~/domain/standing-orders/recurrence"
import type { PublishedValues } from "./published-values"

/** Makes one test of each recurrence rule. */
export function holdCalendar({ calendar }: PublishedValues): void {
	const examples = calendar?.rrule ?? []

	if (examples.length > 0) {
		describe("recurrence rules", () => {
			test.each(examples)("$name: $rrule", ({ dtstart, tzid, rrule, dates }) => {
				const [, year, month, date, hour, minute] = /^(\d{4})(\d{2})(\d{2})T(\d{2})(\d{2})/.exec(dtstart) ?? []
				// A rule that ends is asked for more than it has, so that a date too many shows.
				const ends = /COUNT=|UNTIL=/.test(rrule)
				const found = occurrences({
					rule: rrule,
					startsOn: `${year}-${month}-${date}`,
					at: { time: `${hour}:${minute}`, zone: tzid ?? "UTC" },
					count: dates.length + (ends ? 10 : 0),
				})
				expect(found).toEqual(dates)
			})
		})
	}
}
