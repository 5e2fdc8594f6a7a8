import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { labelledGrams, labelledOunces, labelledTotalWords, weightWords } from "~/domain/weight"

describe("weights in words", () => {
	test("a weight is pounds and ounces, to the nearest ounce", () => {
		expect(weightWords(2722)).toBe("6 lb")
		expect(weightWords(4423)).toBe("9 lb 12 oz")
		expect(weightWords(227)).toBe("8 oz")
		expect(weightWords(453)).toBe("1 lb")
		expect(weightWords(0)).toBe("0 oz")
		expect(() => weightWords(-1)).toThrow(RangeError)
		expect(() => weightWords(1.5)).toThrow(RangeError)
	})
})

describe("labelled weights", () => {
	test("the grams on a label never exceed its ounces, so that the ounces are what is verified", () => {
		expect(labelledGrams(12)).toBe(340)
		expect(labelledGrams(8)).toBe(226)
		expect(labelledGrams(16)).toBe(453)
		expect(labelledGrams(24)).toBe(680)
		expect(() => labelledGrams(0)).toThrow(RangeError)
		expect(() => labelledGrams(12.1)).toThrow(RangeError)
	})

	test("the ounces of a label are read back from its grams, to the quarter", () => {
		expect(labelledOunces(340)).toBe("12 oz")
		expect(labelledOunces(191)).toBe("6¾ oz")
		expect(labelledOunces(7)).toBe("¼ oz")
		fc.assert(
			fc.property(fc.integer({ min: 1, max: 800 }), (quarters) => {
				const expected = `${Math.floor(quarters / 4) || ""}${["", "¼", "½", "¾"][quarters % 4]} oz`
				expect(labelledOunces(labelledGrams(quarters / 4))).toBe(expected)
			}),
		)
	})

	test("a van full of labels weighs what the labels say, without grams lost on the way", () => {
		const lines = [
			{ labelledGrams: labelledGrams(8), pieces: 24 },
			{ labelledGrams: labelledGrams(10), pieces: 12 },
			{ labelledGrams: labelledGrams(12), pieces: 16 },
		]
		expect(labelledTotalWords(lines)).toBe("31 lb 8 oz")
		expect(labelledTotalWords([...lines, { labelledGrams: labelledGrams(13), pieces: 48 }])).toBe("70 lb 8 oz")
		expect(labelledTotalWords([])).toBe("0 oz")
	})
})
