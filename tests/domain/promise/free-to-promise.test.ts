import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { fillStrips } from "~/domain/promise/fill-strip"
import { freeToPromise, type Outlook } from "~/domain/promise/free-to-promise"
import { mostServed } from "./most-served"

const nothing: Outlook = { supplies: [], promises: [], reserve: 0 }

const anyDay = fc.integer({ min: 0, max: 20 }).map((count) => addDays("2026-08-10", count))
const anyOutlook: fc.Arbitrary<Outlook> = fc.record({
	supplies: fc.array(
		fc.record({
			on: anyDay,
			quantity: fc.nat(40),
			kind: fc.constantFrom("free" as const, "held" as const, "expected" as const),
		}),
		{ maxLength: 8 },
	),
	promises: fc.array(fc.record({ on: anyDay, quantity: fc.nat(30) }), { maxLength: 8 }),
	reserve: fc.nat(6),
})
const days = Array.from({ length: 21 }, (_, count) => addDays("2026-08-10", count))

/** The definition itself, day by day, over every day of the horizon. */
function byDefinition(outlook: Outlook, day: string): number {
	const upTo = (entries: readonly { on: string; quantity: number }[], last: string) =>
		entries.filter((entry) => entry.on <= last).reduce((sum, entry) => sum + entry.quantity, 0)
	const later = days.filter((other) => other >= day)
	return Math.min(...later.map((s) => upTo(outlook.supplies, s) - upTo(outlook.promises, s) - outlook.reserve))
}

describe("free to promise", () => {
	test("a promise for a later day is kept out of what is free now", () => {
		const outlook: Outlook = {
			supplies: [{ on: "2026-08-13", quantity: 20, kind: "free" }],
			promises: [{ on: "2026-08-25", quantity: 15 }],
			reserve: 0,
		}
		expect(freeToPromise({ ...outlook, days: ["2026-08-18", "2026-08-25"] }).map((on) => on.free)).toEqual([5, 5])
	})

	test("a later promise that later supply covers takes nothing from today", () => {
		const outlook: Outlook = {
			supplies: [
				{ on: "2026-08-13", quantity: 20, kind: "free" },
				{ on: "2026-08-24", quantity: 15, kind: "expected" },
			],
			promises: [{ on: "2026-08-25", quantity: 15 }],
			reserve: 0,
		}
		expect(freeToPromise({ ...outlook, days: ["2026-08-18"] })).toEqual([{ day: "2026-08-18", free: 20, raw: 20 }])
	})

	test("the reserve for stall and shop is never free", () => {
		const supplies = [{ on: "2026-08-13", quantity: 20, kind: "free" as const }]
		expect(freeToPromise({ supplies, promises: [], reserve: 6, days: ["2026-08-18"] })[0]?.free).toBe(14)
	})

	test("what is promised beyond the supply shows as none free, and the shortfall can be read", () => {
		const outlook: Outlook = {
			supplies: [{ on: "2026-08-13", quantity: 18, kind: "free" }],
			promises: [{ on: "2026-08-18", quantity: 31 }],
			reserve: 0,
		}
		expect(freeToPromise({ ...outlook, days: ["2026-08-18"] })).toEqual([{ day: "2026-08-18", free: 0, raw: -13 }])
	})

	test("promises of days gone by still weigh, and without supply nothing is free", () => {
		const promises = [{ on: "2026-08-01", quantity: 4 }]
		expect(freeToPromise({ ...nothing, promises, days: ["2026-08-18"] })[0]).toMatchObject({ free: 0, raw: -4 })
		expect(freeToPromise({ ...nothing, days: ["2026-08-18"] })[0]).toMatchObject({ free: 0, raw: 0 })
		expect(freeToPromise({ ...nothing, days: [] })).toEqual([])
	})

	test("the answer is the definition's, for days in any order", () => {
		fc.assert(
			fc.property(anyOutlook, fc.shuffledSubarray(days), (outlook, asked) => {
				for (const { day, raw, free } of freeToPromise({ ...outlook, days: asked })) {
					expect(raw).toBe(byDefinition(outlook, day))
					expect(free).toBe(Math.max(0, raw))
				}
			}),
		)
	})

	test("promising exactly what is free breaks no promise, and one more breaks one", () => {
		fc.assert(
			fc.property(anyOutlook, fc.constantFrom(...days), fc.nat(3), (outlook, on, extra) => {
				const [before] = freeToPromise({ ...outlook, days: [on] })
				if (!before || before.raw < 0) return
				const promises = [...outlook.promises, { on, quantity: before.free + extra }]
				const after = freeToPromise({ ...outlook, promises, days: [on] })[0]
				expect(after?.raw).toBe(0 - extra)
			}),
		)
	})

	test("where nothing expires, what is free never falls from one day to the next", () => {
		fc.assert(
			fc.property(anyOutlook, (outlook) => {
				const figures = freeToPromise({ ...outlook, days }).map((on) => on.raw)
				for (const [index, figure] of figures.entries())
					expect(figure).toBeGreaterThanOrEqual(figures[index - 1] ?? figure)
			}),
		)
	})

	test("a lot serves no day after its best-before", () => {
		const outlook: Outlook = {
			supplies: [{ on: "2026-08-13", until: "2026-08-20", quantity: 20, kind: "free" }],
			promises: [],
			reserve: 0,
		}
		const days = ["2026-08-20", "2026-08-21"]
		expect(freeToPromise({ ...outlook, days }).map((on) => on.free)).toEqual([20, 0])
	})

	test("a lot that is soon over serves the earlier promise, and takes nothing from later days", () => {
		const outlook: Outlook = {
			supplies: [
				{ on: "2026-08-13", until: "2026-08-20", quantity: 10, kind: "free" },
				{ on: "2026-08-13", until: "2026-12-01", quantity: 10, kind: "free" },
			],
			promises: [{ on: "2026-08-18", quantity: 8 }],
			reserve: 0,
		}
		const days = ["2026-08-18", "2026-08-25"]
		expect(freeToPromise({ ...outlook, days }).map((on) => on.free)).toEqual([12, 10])
	})

	test("what cannot be kept by a lot that is over is taken from the lot that keeps longer", () => {
		const outlook: Outlook = {
			supplies: [
				{ on: "2026-08-13", until: "2026-08-20", quantity: 10, kind: "free" },
				{ on: "2026-08-13", until: "2026-12-01", quantity: 10, kind: "free" },
			],
			promises: [
				{ on: "2026-08-18", quantity: 14 },
				{ on: "2026-08-25", quantity: 2 },
			],
			reserve: 1,
		}
		const days = ["2026-08-18", "2026-08-25"]
		expect(freeToPromise({ ...outlook, days }).map((on) => on.free)).toEqual([3, 3])
	})

	test("with lots that expire, it is the largest quantity that any search finds room for", () => {
		const date = fc.integer({ min: 10, max: 16 })
		const lot = fc.tuple(date, date, fc.nat(3)).map(([a, b, quantity]) => ({
			on: `2026-08-${Math.min(a, b)}`,
			until: `2026-08-${Math.max(a, b)}`,
			quantity,
			kind: "free" as const,
		}))
		const promise = fc.record({ on: date.map((on) => `2026-08-${on}`), quantity: fc.nat(2) })
		fc.assert(
			fc.property(
				fc.array(lot, { maxLength: 4 }),
				fc.array(promise, { maxLength: 3 }),
				date,
				(supplies, promises, on) => {
					const day = `2026-08-${on}`
					const lots = supplies.map((supply, index) => ({
						lotId: `L${index}`,
						availableFrom: supply.on,
						bestBefore: supply.until,
						pieces: supply.quantity,
					}))
					const asked = promises.map((one, index) => ({ orderId: `O${index}`, on: one.on, pieces: one.quantity }))
					const fits = (extra: number) => {
						const orders = [...asked, { orderId: "more", on: day, pieces: extra }]
						return mostServed(lots, orders) === orders.reduce((sum, order) => sum + order.pieces, 0)
					}
					if (!fits(0)) return
					const [answer] = freeToPromise({ supplies, promises, reserve: 0, days: [day] })
					expect(fits(answer?.raw ?? -1)).toBe(true)
					expect(fits((answer?.raw ?? -1) + 1)).toBe(false)
				},
			),
			{ numRuns: 500 },
		)
	})

	test("a year of forty thousand entries is counted in one pass", () => {
		const year = Array.from({ length: 365 }, (_, count) => addDays("2026-01-01", count))
		const entries = Array.from({ length: 20_000 }, (_, index) => ({
			on: year[index % 365] as string,
			quantity: 1 + (index % 3),
		}))
		const started = performance.now()
		const answer = freeToPromise({
			supplies: entries.map((entry) => ({ ...entry, kind: "free" as const })),
			promises: entries,
			reserve: 0,
			days: year,
		})
		expect(answer.every((on) => on.raw === 0)).toBe(true)
		expect(performance.now() - started).toBeLessThan(2000)
	})
})

describe("the fill strip of a day", () => {
	test("held lots count for a day after their release, and are told apart from what is free", () => {
		const outlook: Outlook = {
			supplies: [
				{ on: "2026-08-13", quantity: 16, kind: "free" },
				{ on: "2026-08-14", quantity: 6, kind: "held" },
				{ on: "2026-08-24", quantity: 8, kind: "expected" },
			],
			promises: [],
			reserve: 0,
		}
		const [tuesday, nextTuesday] = fillStrips({ ...outlook, days: ["2026-08-18", "2026-08-25"] })
		expect(tuesday).toEqual({
			day: "2026-08-18",
			free: 16,
			held: 6,
			heldUntil: "2026-08-14",
			expected: 0,
			expectedOn: null,
			next: { on: "2026-08-24", quantity: 8, kind: "expected" },
		})
		expect(nextTuesday).toMatchObject({ free: 16, held: 6, expected: 8, expectedOn: "2026-08-24", next: null })
	})

	test("promises are laid against the surest stock first", () => {
		const outlook: Outlook = {
			supplies: [
				{ on: "2026-08-13", quantity: 10, kind: "free" },
				{ on: "2026-08-13", quantity: 10, kind: "held" },
			],
			promises: [{ on: "2026-08-18", quantity: 12 }],
			reserve: 0,
		}
		expect(fillStrips({ ...outlook, days: ["2026-08-18"] })[0]).toMatchObject({ free: 0, held: 8, expected: 0 })
	})

	test("a held lot that is over by the day is not named as what the day waits for", () => {
		const outlook: Outlook = {
			supplies: [
				{ on: "2026-08-14", until: "2026-12-01", quantity: 6, kind: "held" },
				{ on: "2026-08-20", until: "2026-08-22", quantity: 6, kind: "held" },
			],
			promises: [],
			reserve: 0,
		}
		expect(fillStrips({ ...outlook, days: ["2026-08-25"] })[0]).toMatchObject({ held: 6, heldUntil: "2026-08-14" })
	})

	test("the parts are never negative and sum to what is free to promise", () => {
		fc.assert(
			fc.property(anyOutlook, (outlook) => {
				const free = freeToPromise({ ...outlook, days })
				for (const [index, strip] of fillStrips({ ...outlook, days }).entries()) {
					expect(Math.min(strip.free, strip.held, strip.expected)).toBeGreaterThanOrEqual(0)
					expect(strip.free + strip.held + strip.expected).toBe(free[index]?.free)
				}
			}),
		)
	})
})
