import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { planSeason, type SeasonProduct, seasonWeeks, weekOf } from "~/domain/orders/season"
import { shortSeasonSentence } from "~/domain/orders/season-words"

const MONDAY = "2026-08-10"
const weeks = seasonWeeks("2026-08-13", 4)
const product = (facts: Partial<SeasonProduct>): SeasonProduct => ({
	piecesPerCase: 12,
	reserve: 0,
	stock: [],
	expected: [],
	demands: [],
	...facts,
})

describe("the season ahead", () => {
	test("goes by weeks from Monday", () => {
		expect(weeks).toEqual([MONDAY, "2026-08-17", "2026-08-24", "2026-08-31"])
		expect(weekOf("2026-08-16")).toBe(MONDAY)
	})

	test("keeps commitments, standing orders and single orders apart", () => {
		const demands = [
			{ on: "2026-08-11", class: "commitment" as const, pieces: 24 },
			{ on: "2026-08-14", class: "standing" as const, pieces: 12 },
			{ on: "2026-08-14", class: "single" as const, pieces: 36 },
			{ on: "2026-08-18", class: "standing" as const, pieces: 12 },
		]
		const plan = planSeason(product({ demands }), weeks)
		expect(plan[0]?.wanted).toEqual({ commitment: 24, standing: 12, single: 36 })
		expect(plan[1]?.wanted).toEqual({ commitment: 0, standing: 12, single: 0 })
	})

	test("carries what one week leaves into the next, and says which week falls short at which figure", () => {
		const plan = planSeason(
			product({
				stock: [{ on: MONDAY, pieces: 30 }],
				expected: [{ on: "2026-08-20", low: 0, likely: 12, high: 24 }],
				demands: [
					{ on: "2026-08-11", class: "single", pieces: 24 },
					{ on: "2026-08-25", class: "single", pieces: 24 },
				],
			}),
			weeks,
		)
		expect(plan.map(({ short }) => short)).toEqual([
			{ low: 0, likely: 0, high: 0 },
			{ low: 0, likely: 0, high: 0 },
			{ low: 18, likely: 6, high: 0 },
			{ low: 0, likely: 0, high: 0 },
		])
		expect(plan[1]?.there).toEqual({ low: 6, likely: 18, high: 30 })
	})

	test("does not serve Tuesday from what comes on Friday of the same week", () => {
		const supply = { on: "2026-08-14", pieces: 12 }
		const plan = planSeason(
			product({ stock: [supply], demands: [{ on: "2026-08-11", class: "single", pieces: 12 }] }),
			weeks,
		)
		expect(plan[0]?.short.low).toBe(12)
		expect(plan[1]?.there.low).toBe(12)
	})

	test("keeps the reserve back and lets nothing serve beyond its best-before", () => {
		const stock = [{ on: MONDAY, until: "2026-08-20", pieces: 24 }]
		const late = { on: "2026-08-25", class: "single" as const, pieces: 12 }
		expect(planSeason(product({ stock, demands: [late] }), weeks)[2]?.short.low).toBe(12)
		const early = { on: "2026-08-11", class: "single" as const, pieces: 24 }
		expect(planSeason(product({ stock, reserve: 12, demands: [early] }), weeks)[0]?.short.low).toBe(12)
	})

	test("says in a sentence what will be short, with its figures", () => {
		const demands = [
			{ on: "2026-08-18", class: "single" as const, pieces: 30 },
			{ on: "2026-08-25", class: "single" as const, pieces: 12 },
		]
		const expected = [{ on: MONDAY, low: 12, likely: 30, high: 60 }]
		const row = {
			name: "Basswood section",
			piecesPerCase: 12,
			weeks: planSeason(product({ demands, expected }), weeks),
		}
		expect(shortSeasonSentence(row)).toBe(
			"Basswood section is short by 2 cases in the week of August 17, and in 1 week after it (3 cases in all), at the low figure; at the likely figure by 1 case.",
		)
		expect(shortSeasonSentence({ ...row, weeks: planSeason(product({ expected }), weeks) })).toBeNull()
	})

	test("never meets more than is there, and more crop is never shorter", () => {
		const on = fc.nat(27).map((days) => addDays(MONDAY, days))
		const pieces = fc.nat(60)
		fc.assert(
			fc.property(
				fc.array(fc.record({ on, pieces }), { maxLength: 6 }),
				fc.array(fc.tuple(on, pieces, pieces, pieces), { maxLength: 6 }),
				fc.array(fc.record({ on, pieces, class: fc.constant("single" as const) }), { maxLength: 12 }),
				fc.nat(30),
				(stock, ranges, demands, reserve) => {
					const expected = ranges.map(([day, a, b, c]) => ({ on: day, low: a, likely: a + b, high: a + b + c }))
					const plan = planSeason(product({ stock, expected, demands, reserve }), weeks)
					const total = (of: readonly { pieces: number }[]) => of.reduce((sum, one) => sum + one.pieces, 0)
					for (const figure of ["low", "likely", "high"] as const) {
						const short = plan.reduce((sum, week) => sum + week.short[figure], 0)
						const supply = total(stock) + expected.reduce((sum, one) => sum + one[figure], 0)
						expect(total(demands) - short).toBeLessThanOrEqual(Math.max(0, supply - reserve))
						expect(short).toBeLessThanOrEqual(total(demands))
					}
					const shortAt = (figure: "low" | "likely" | "high") => plan.reduce((sum, week) => sum + week.short[figure], 0)
					expect(shortAt("likely")).toBeLessThanOrEqual(shortAt("low"))
					expect(shortAt("high")).toBeLessThanOrEqual(shortAt("likely"))
				},
			),
		)
	})
})
