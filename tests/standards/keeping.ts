import { describe, expect, test } from "vitest"
import {
	fermentationRisk,
	granulationTendency,
	MOISTURE_LIMITS,
	moistureAdvice,
	WORST_FOR_GRANULATION,
} from "~/domain/lots/keeping"
import type { PublishedValues } from "./published-values"

/** A share or ratio in whole steps: 17.1 in tenths is 171. */
const steps = (figure: string, places: number) => Math.round(Number(figure) * 10 ** places)

/** The first and last step of "under 17.1", "below 1.7", "17.1-18.0", "1.7 to 2.1", "over 20", "above 2.1". */
function rangeOf(words: string, places: number): { first: number | null; last: number | null } {
	const [, under] = /^(?:under|below) ([\d.]+)$/.exec(words) ?? []
	if (under) return { first: null, last: steps(under, places) - 1 }
	const [, over] = /^(?:over|above) ([\d.]+)$/.exec(words) ?? []
	if (over) return { first: steps(over, places) + 1, last: null }
	const [, from, to] = /^([\d.]+)\s*(?:-|–|to)\s*([\d.]+)$/.exec(words) ?? []
	if (!from || !to) throw new Error(`a range that cannot be read: ${words}`)
	return { first: steps(from, places), last: steps(to, places) }
}

/** Expects the rule to give `result` at both ends of the range, and something else beyond. */
function expectRange(rule: (at: number) => string, { first, last }: ReturnType<typeof rangeOf>, result: string): void {
	if (first !== null) expect([rule(first), rule(first - 1) === result]).toEqual([result, false])
	if (last !== null) expect([rule(last), rule(last + 1) === result]).toEqual([result, false])
}

/** Makes one test of each class of water, of granulation, and of the limits of water. */
export function holdKeeping({ storage_and_freezing: storage }: PublishedValues): void {
	const classes = storage?.fermentation ?? []
	if (classes.length > 0) {
		describe("fermentation", () => {
			test.each(classes)("$moisture_pct % of water: $risk", ({ moisture_pct, risk }) => {
				expectRange(fermentationRisk, rangeOf(moisture_pct, 1), risk)
			})
		})
	}

	const ratios = storage?.granulation?.glucose_water ?? []
	if (ratios.length > 0) {
		describe("granulation", () => {
			test.each(ratios)("glucose over water $ratio: $tendency", ({ ratio, tendency }) => {
				expectRange(granulationTendency, rangeOf(ratio, 2), tendency)
			})
		})
	}
	const worst = storage?.granulation?.worst_temp
	if (worst) {
		test(`honey granulates fastest near ${worst.f} °F`, () => {
			const { fahrenheit: f, celsius: c, fromFahrenheit, toFahrenheit } = WORST_FOR_GRANULATION
			expect({ f, c, range_f: [fromFahrenheit, toFahrenheit] }).toEqual({
				f: worst.f,
				c: worst.c,
				range_f: worst.range_f,
			})
		})
	}

	const limits = storage?.usda_moisture_max
	if (limits) {
		test(`USDA: at most ${limits.grade_a_b_pct} % of water for A and B, ${limits.grade_c_pct} % for C`, () => {
			const [ab, c] = [Math.round(limits.grade_a_b_pct * 10), Math.round(limits.grade_c_pct * 10)]
			expect(MOISTURE_LIMITS).toMatchObject({ usdaGradeAB: ab, usdaGradeC: c })
			expect(moistureAdvice(ab)?.isOverLimit).toBe(false)
			expect(moistureAdvice(ab + 1)?.words).toContain(`${limits.grade_a_b_pct.toFixed(1)} % of USDA Grades A and B`)
			expect(moistureAdvice(c + 1)?.words).toContain(`${limits.grade_c_pct.toFixed(1)} % of USDA Grade C`)
		})
	}
}
