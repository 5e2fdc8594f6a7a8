import fc from "fast-check"
import { describe, expect, test } from "vitest"
import type { Weekday } from "~/domain/calendar"
import { type Cadence, cadenceOf, cadenceWords, type NthWeekday, ruleOf } from "~/domain/standing-orders/cadence"

const months = fc.uniqueArray(fc.integer({ min: 1, max: 12 })).map((list) => list.toSorted((a, b) => a - b))
const anyWeekday = fc.integer({ min: 1, max: 7 }).map((day) => day as Weekday)
const anyCadence: fc.Arbitrary<Cadence> = fc.oneof(
	fc.record({
		every: fc.constant("week" as const),
		interval: fc.integer({ min: 1, max: 8 }),
		weekday: anyWeekday,
		months,
	}),
	fc.record({
		every: fc.constant("month" as const),
		nth: fc.constantFrom<NthWeekday>(1, 2, 3, 4, -1),
		weekday: anyWeekday,
		months,
	}),
)

describe("how often a standing order comes", () => {
	test.each<[Cadence, string, string]>([
		[{ every: "week", interval: 1, weekday: 2, months: [] }, "FREQ=WEEKLY;BYDAY=TU", "every Tuesday"],
		[{ every: "week", interval: 2, weekday: 2, months: [] }, "FREQ=WEEKLY;INTERVAL=2;BYDAY=TU", "every other Tuesday"],
		[
			{ every: "week", interval: 3, weekday: 5, months: [7, 5, 6] },
			"FREQ=WEEKLY;INTERVAL=3;BYMONTH=5,6,7;BYDAY=FR",
			"every third Friday, from May to July",
		],
		[
			{ every: "month", nth: 1, weekday: 2, months: [6, 8] },
			"FREQ=MONTHLY;BYMONTH=6,8;BYDAY=1TU",
			"on the first Tuesday of the month, in June and August",
		],
		[
			{ every: "month", nth: -1, weekday: 5, months: [12] },
			"FREQ=MONTHLY;BYMONTH=12;BYDAY=-1FR",
			"on the last Friday of the month, in December",
		],
		[
			{ every: "week", interval: 1, weekday: 1, months: [1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12] },
			"FREQ=WEEKLY;BYDAY=MO",
			"every Monday",
		],
	])("the choices %j are the rule %s and read “%s”", (cadence, rule, words) => {
		expect(ruleOf(cadence)).toBe(rule)
		expect(cadenceWords(cadence)).toBe(words)
	})

	test("a rule read back gives the choices it was made of", () => {
		fc.assert(
			fc.property(anyCadence, (cadence) => {
				const wholeYear = cadence.months.length === 12
				expect(cadenceOf(ruleOf(cadence))).toEqual(wholeYear ? { ...cadence, months: [] } : cadence)
			}),
		)
	})

	test("a rule that the form cannot make is not read", () => {
		for (const rule of [
			"",
			"every Tuesday",
			"FREQ=DAILY",
			"FREQ=WEEKLY",
			"FREQ=WEEKLY;BYDAY=TU,TH",
			"FREQ=WEEKLY;INTERVAL=9;BYDAY=TU",
			"FREQ=WEEKLY;INTERVAL=1;BYDAY=TU",
			"FREQ=WEEKLY;BYDAY=1TU",
			"FREQ=MONTHLY;BYDAY=TU",
			"FREQ=MONTHLY;BYDAY=5TU",
			"FREQ=MONTHLY;BYDAY=0TU",
			"FREQ=MONTHLY;INTERVAL=2;BYDAY=1TU",
			"FREQ=WEEKLY;BYMONTH=13;BYDAY=TU",
			"FREQ=WEEKLY;BYMONTH=,;BYDAY=TU",
		]) {
			expect(cadenceOf(rule)).toBeNull()
		}
	})

	test("choices outside the form throw", () => {
		for (const interval of [0, 9, 1.5, -1]) {
			expect(() => ruleOf({ every: "week", interval, weekday: 2, months: [] })).toThrow(RangeError)
		}
		expect(() => ruleOf({ every: "week", interval: 1, weekday: 2, months: [0] })).toThrow(RangeError)
	})
})
