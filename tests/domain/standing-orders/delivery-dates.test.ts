import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays, daysBetween, type Weekday, weekday } from "~/domain/calendar"
import { type Cadence, cadenceOf, ruleOf } from "~/domain/standing-orders/cadence"
import { nextDeliveryDates, type StandingRule } from "~/domain/standing-orders/delivery-dates"
import { occurrences } from "~/domain/standing-orders/recurrence"

const everyOtherTuesday: StandingRule = {
	rule: "FREQ=WEEKLY;INTERVAL=2;BYDAY=TU",
	startsOn: "2026-08-18",
	endsOn: null,
	pausedFrom: null,
	deliveryWeekdays: [2, 5],
	shutDays: [],
	skips: [],
}
const days = (standing: StandingRule, from: string, count: number) =>
	nextDeliveryDates(standing, from, count).map((date) => date.deliveryOn)

describe("the next dates of a standing order", () => {
	test("every other Tuesday gives every other Tuesday", () => {
		expect(days(everyOtherTuesday, "2026-08-13", 6)).toEqual([
			"2026-08-18",
			"2026-09-01",
			"2026-09-15",
			"2026-09-29",
			"2026-10-13",
			"2026-10-27",
		])
	})

	test("looked at later, the weeks are still counted from the start", () => {
		expect(days(everyOtherTuesday, "2026-08-19", 2)).toEqual(["2026-09-01", "2026-09-15"])
		expect(days(everyOtherTuesday, "2027-08-19", 1)).toEqual(["2027-08-31"])
	})

	test("a start on another weekday begins with the first date that fits", () => {
		const thursday = { ...everyOtherTuesday, startsOn: "2026-08-13" }
		expect(days(thursday, "2026-08-13", 2)).toEqual(["2026-08-18", "2026-09-01"])
	})

	test("a skipped date stays in view, marked, and so do all dates of a pause", () => {
		const bent = { ...everyOtherTuesday, skips: ["2026-09-01"], pausedFrom: "2026-09-29" }
		expect(nextDeliveryDates(bent, "2026-08-13", 4).map((date) => date.isSkipped)).toEqual([false, true, false, true])
	})

	test("a date on a shut day moves to the store's next delivery day and keeps its name", () => {
		const shut = { ...everyOtherTuesday, shutDays: ["2026-09-01"] }
		expect(nextDeliveryDates(shut, "2026-08-19", 2)).toEqual([
			{ ruleOn: "2026-09-01", deliveryOn: "2026-09-04", isMoved: true, isSkipped: false },
			{ ruleOn: "2026-09-15", deliveryOn: "2026-09-15", isMoved: false, isSkipped: false },
		])
	})

	test("a date that moved past today is still to come", () => {
		const shut = { ...everyOtherTuesday, shutDays: ["2026-09-01"] }
		expect(days(shut, "2026-09-03", 1)).toEqual(["2026-09-04"])
	})

	test("a weekly date that would move onto the next one is dropped: the van comes once", () => {
		const weekly = { ...everyOtherTuesday, rule: "FREQ=WEEKLY;BYDAY=TU", deliveryWeekdays: [2 as const] }
		const shut = { ...weekly, shutDays: ["2026-08-25", "2026-09-01"] }
		expect(days(shut, "2026-08-13", 3)).toEqual(["2026-08-18", "2026-09-08", "2026-09-15"])
	})

	test("a rule for a weekday when the van does not come is met on the next day it does", () => {
		const wednesdays = { ...everyOtherTuesday, rule: "FREQ=WEEKLY;BYDAY=WE" }
		expect(days(wednesdays, "2026-08-18", 2)).toEqual(["2026-08-21", "2026-08-28"])
	})

	test("nothing is delivered after the last day", () => {
		const ending = { ...everyOtherTuesday, endsOn: "2026-09-15" }
		expect(days(ending, "2026-08-13", 6)).toEqual(["2026-08-18", "2026-09-01", "2026-09-15"])
		expect(days({ ...ending, shutDays: ["2026-09-15"] }, "2026-08-13", 6)).toEqual(["2026-08-18", "2026-09-01"])
	})

	test("the last Friday of the chosen months", () => {
		const monthly = { ...everyOtherTuesday, rule: "FREQ=MONTHLY;BYMONTH=6,7;BYDAY=-1FR", startsOn: "2026-07-01" }
		expect(days(monthly, "2026-07-01", 3)).toEqual(["2026-07-31", "2027-06-25", "2027-07-30"])
	})

	test("without a delivery day there is no date, and a strange rule throws", () => {
		expect(days({ ...everyOtherTuesday, deliveryWeekdays: [] }, "2026-08-13", 3)).toEqual([])
		expect(days(everyOtherTuesday, "2026-08-13", 0)).toEqual([])
		expect(() => days({ ...everyOtherTuesday, rule: "FREQ=DAILY" }, "2026-08-13", 3)).toThrow(RangeError)
	})

	test("with any shut days and any cadence, dates rise, lie on open delivery days and are asked for once", () => {
		const day = fc.integer({ min: 0, max: 200 }).map((ahead) => addDays("2026-05-01", ahead))
		const anyWeekday = fc.integer({ min: 1, max: 7 }).map((one) => one as Weekday)
		fc.assert(
			fc.property(
				fc.record({ interval: fc.integer({ min: 1, max: 4 }), weekday: anyWeekday, startsOn: day, from: day }),
				fc.uniqueArray(anyWeekday, { minLength: 1, maxLength: 3 }),
				fc.uniqueArray(day, { maxLength: 12 }),
				({ interval, weekday: on, startsOn, from }, deliveryWeekdays, shutDays) => {
					const rule = ruleOf({ every: "week", interval, weekday: on, months: [] })
					const standing = { ...everyOtherTuesday, rule, startsOn, deliveryWeekdays, shutDays }
					const dates = nextDeliveryDates(standing, from, 5)
					expect(dates).toHaveLength(5)
					for (const [index, date] of dates.entries()) {
						expect(date.deliveryOn >= from && date.deliveryOn >= date.ruleOn && date.ruleOn >= startsOn).toBe(true)
						expect(deliveryWeekdays).toContain(weekday(date.deliveryOn))
						expect(shutDays).not.toContain(date.deliveryOn)
						const before = dates[index - 1]
						if (before) {
							expect(date.deliveryOn > before.deliveryOn).toBe(true)
							expect(daysBetween(before.ruleOn, date.ruleOn) % (7 * interval)).toBe(0)
						}
					}
					const shorter = nextDeliveryDates(standing, from, 2)
					expect(shorter).toEqual(dates.slice(0, 2))
				},
			),
			{ numRuns: 60 },
		)
	})
})

describe("a recurrence", () => {
	test("days before the first asked are passed over, and the last allowed is included", () => {
		const search = { rule: "FREQ=WEEKLY;BYDAY=TU", startsOn: "2026-08-18", count: 10 }
		expect(occurrences({ ...search, from: "2026-08-20", until: "2026-09-08" })).toEqual([
			"2026-08-25",
			"2026-09-01",
			"2026-09-08",
		])
		expect(occurrences({ ...search, count: 0 })).toEqual([])
	})

	test("a rule's own count is counted from its start, not from the day asked", () => {
		const search = { rule: "FREQ=WEEKLY;COUNT=3", startsOn: "2026-08-18", from: "2026-08-20", count: 10 }
		expect(occurrences(search)).toEqual(["2026-08-25", "2026-09-01"])
	})

	test("a leap day is found from one to the next, and a date that never comes is not looked for without end", () => {
		const search = { rule: "FREQ=YEARLY;BYMONTH=2;BYMONTHDAY=29", startsOn: "2096-02-29", count: 3 }
		expect(occurrences(search)).toEqual(["2096-02-29", "2104-02-29", "2108-02-29"])
		expect(occurrences({ ...search, rule: "FREQ=MONTHLY;BYMONTH=2;BYMONTHDAY=30" })).toEqual([])
	})

	test("a long run of dates agrees with counting weeks by hand", () => {
		fc.assert(
			fc.property(
				fc.integer({ min: 1, max: 8 }),
				fc.nat(3000),
				fc.integer({ min: 1, max: 80 }),
				(interval, ahead, count) => {
					const from = addDays("2026-08-18", ahead)
					const first = Math.ceil(ahead / (7 * interval))
					const byHand = Array.from({ length: count }, (_, index) =>
						addDays("2026-08-18", (first + index) * 7 * interval),
					)
					const rule = `FREQ=WEEKLY;INTERVAL=${interval};BYDAY=TU`
					expect(occurrences({ rule, startsOn: "2026-08-18", from, count })).toEqual(byHand)
				},
			),
			{ numRuns: 40 },
		)
	})

	test("a malformed rule throws", () => {
		for (const rule of ["FREQ=NONSENSE", "hello", "FREQ=WEEKLY;BYDAY=XX"]) {
			expect(() => occurrences({ rule, startsOn: "2026-08-18", count: 1 })).toThrow()
		}
	})
})

test("the dates are those of the rule from its first day, however long ago that was", () => {
	const someRule = fc.oneof(
		fc
			.record({ interval: fc.integer({ min: 1, max: 4 }), weekday: fc.integer({ min: 1, max: 7 }) })
			.map((week) => ruleOf({ every: "week", months: [], ...week } as Cadence)),
		fc
			.record({ nth: fc.constantFrom(1, 2, 4, -1), weekday: fc.integer({ min: 1, max: 7 }) })
			.map((month) => ruleOf({ every: "month", months: [], ...month } as Cadence)),
	)
	fc.assert(
		fc.property(someRule, fc.integer({ min: 0, max: 900 }), (rule, daysAgo) => {
			const from = "2026-08-13"
			const startsOn = addDays(from, -daysAgo)
			const cadence = cadenceOf(rule)
			const first =
				cadence?.every === "week" ? addDays(startsOn, (cadence.weekday - weekday(startsOn) + 7) % 7) : startsOn
			const standing = { rule, startsOn, endsOn: null, pausedFrom: null, shutDays: [], skips: [] }
			const found = nextDeliveryDates({ ...standing, deliveryWeekdays: [1, 2, 3, 4, 5, 6, 7] }, from, 5)
			expect(found.map(({ ruleOn }) => ruleOn)).toEqual(occurrences({ rule, startsOn: first, from, count: 5 }))
		}),
		{ numRuns: 60 },
	)
})
