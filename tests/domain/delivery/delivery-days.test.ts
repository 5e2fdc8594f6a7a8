import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays, timeWords, weekday } from "~/domain/calendar"
import { firstDeliveryDay, isOpen, nextDeliveryDays, type Round } from "~/domain/delivery/delivery-days"

const zone = "America/New_York"
const tuesday: Round = { weekday: 2, cutoffDaysBefore: 4, cutoffTime: "12:00" }
const friday: Round = { weekday: 5, cutoffDaysBefore: 2, cutoffTime: "12:00:00" }
const from = "2026-08-13"

describe("delivery days", () => {
	test("the rounds give the days the van comes, each with the moment its orders close", () => {
		const days = nextDeliveryDays({ rounds: [tuesday, friday], shutDays: [], zone, from, count: 4 })
		expect(days.map((day) => [day.on, day.cutoffAt.toISOString()])).toEqual([
			["2026-08-14", "2026-08-12T16:00:00.000Z"],
			["2026-08-18", "2026-08-14T16:00:00.000Z"],
			["2026-08-21", "2026-08-19T16:00:00.000Z"],
			["2026-08-25", "2026-08-21T16:00:00.000Z"],
		])
	})

	test("a shut day is left out", () => {
		const days = nextDeliveryDays({ rounds: [tuesday], shutDays: ["2026-08-18"], zone, from, count: 2 })
		expect(days.map((day) => day.on)).toEqual(["2026-08-25", "2026-09-01"])
	})

	test("last orders stay at noon by the clock on both sides of a clock change", () => {
		const days = nextDeliveryDays({ rounds: [tuesday], shutDays: [], zone, from: "2026-10-27", count: 2 })
		expect(days.map((day) => day.cutoffAt.toISOString())).toEqual([
			"2026-10-23T16:00:00.000Z",
			"2026-10-30T16:00:00.000Z",
		])
		const after = nextDeliveryDays({ rounds: [tuesday], shutDays: [], zone, from: "2026-11-10", count: 1 })
		expect(after[0]?.cutoffAt.toISOString()).toBe("2026-11-06T17:00:00.000Z")
	})

	test("orders are taken until last orders, not at them", () => {
		const [day] = nextDeliveryDays({ rounds: [tuesday], shutDays: [], zone, from, count: 1 })
		if (!day) throw new Error("no delivery day")
		expect(isOpen(day, new Date("2026-08-14T15:59:59.999Z"))).toBe(true)
		expect(isOpen(day, new Date("2026-08-14T16:00:00.000Z"))).toBe(false)
	})

	test("without rounds, or with every day shut, there is no delivery day", () => {
		const year = Array.from({ length: 400 }, (_, ahead) => addDays(from, ahead))
		expect(nextDeliveryDays({ rounds: [], shutDays: [], zone, from, count: 3 })).toEqual([])
		expect(nextDeliveryDays({ rounds: [tuesday], shutDays: year, zone, from, count: 3 })).toEqual([])
		expect(firstDeliveryDay({ from, deliveryWeekdays: [2], shutDays: year })).toBeNull()
		expect(firstDeliveryDay({ from, deliveryWeekdays: [], shutDays: [] })).toBeNull()
	})

	test("every day found is a day of a round, open, in order and not before the first asked", () => {
		const day = fc.integer({ min: 0, max: 400 }).map((ahead) => addDays("2026-01-01", ahead))
		const weekdays = fc.uniqueArray(fc.integer({ min: 1, max: 7 }), { minLength: 1 })
		fc.assert(
			fc.property(day, weekdays, fc.array(day, { maxLength: 20 }), fc.nat(8), (start, on, shutDays, count) => {
				const rounds = on.map((one): Round => ({ weekday: one, cutoffDaysBefore: 1, cutoffTime: "18:00" }))
				const days = nextDeliveryDays({ rounds, shutDays, zone, from: start, count })
				expect(days).toHaveLength(count)
				for (const [index, found] of days.entries()) {
					expect(on).toContain(weekday(found.on))
					expect(shutDays).not.toContain(found.on)
					expect(found.on > (days[index - 1]?.on ?? addDays(start, -1))).toBe(true)
					expect(timeWords(found.cutoffAt, zone)).toBe("6 pm")
				}
				const first = firstDeliveryDay({ from: start, deliveryWeekdays: on, shutDays })
				if (count > 0) expect(first).toBe(days[0]?.on)
			}),
			{ numRuns: 50 },
		)
	})
})
