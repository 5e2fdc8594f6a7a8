import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { doubtWords, isWeightDoubtful, lineAmount, readNetWeight } from "~/domain/pricing/weighed-line"

const line = { cases: 1, caseCents: 14_286, poundCents: 1600, weighedGrams: null }

describe("what a line comes to", () => {
	test("is its cases at the price of a case where it is priced by the case", () => {
		expect(lineAmount({ cases: 3, caseCents: 11_400, poundCents: null, weighedGrams: null })).toEqual({
			cents: 34_200,
			isEstimate: false,
		})
	})

	test("is an estimate until it is weighed, and then its net weight at the price of the pound", () => {
		expect(lineAmount(line)).toEqual({ cents: 14_286, isEstimate: true })
		// 4423 g is 9.75104… lb, at 16.00 a lb 156.0166….
		expect(lineAmount({ ...line, weighedGrams: 4423 })).toEqual({ cents: 15_602, isEstimate: false })
	})

	test("is nothing where nothing is given", () => {
		expect(lineAmount({ ...line, cases: 0 })).toEqual({ cents: 0, isEstimate: false })
	})
})

describe("a net weight as it is typed", () => {
	test.each([
		["9 lb 12 oz", 4422],
		["9.75 lb", 4422],
		["156 oz", 4422],
		["4423 g", 4423],
		["4,423 kg", 4423],
		["9 lb 12½ oz", 4436],
	])("%s is %d g, a part of a gram dropped", (typed, grams) => {
		expect(readNetWeight(typed)).toEqual({ ok: true, grams })
	})

	test.each([
		["", "empty"],
		["4423", "no-unit"],
		["a lot", "not-a-weight"],
		["0 lb", "nothing"],
		["-3 lb", "nothing"],
		["9000 kg", "too-much"],
		["9 lb 12 oz 3 g", "not-a-weight"],
	])("%j is refused: %s", (typed, reason) => {
		expect(readNetWeight(typed)).toMatchObject({ ok: false, reason })
	})

	test("is never more than what was typed", () => {
		fc.assert(
			fc.property(fc.integer({ min: 1, max: 99 }), fc.integer({ min: 0, max: 15 }), (pounds, ounces) => {
				const read = readNetWeight(`${pounds} lb ${ounces} oz`)
				const exact = (pounds + ounces / 16) * 453.59237
				expect(read.ok && read.grams <= exact + 1e-6 && read.grams > exact - 1).toBe(true)
			}),
		)
	})
})

describe("a weight far from the label", () => {
	const pieces = { pieces: 12, pieceNetGrams: 340 }
	test("is asked about above fifteen percent to either side, not at it", () => {
		expect([4692, 4693, 3468, 3467].map((grams) => isWeightDoubtful(grams, pieces))).toEqual([false, true, false, true])
	})

	test("is told in words", () => {
		expect(doubtWords(907, pieces)).toBe(
			"2 lb is 78 % less than 12 pieces usually weigh, 9 lb. Weigh again, or say that it is right.",
		)
	})
})
