import { expect, test } from "vitest"
import { shortSentence } from "~/domain/orders/short-sentence"

const line = { productName: "Basswood section, clover", asked: 4, given: 2, deliveryOn: "2026-08-18" }

test("a short line is told with what was asked, what comes and why", () => {
	expect(shortSentence(line)).toBe(
		"You asked for 4 cases of Basswood section, clover, and get 2. That is all that can be ready for Tuesday, August 18.",
	)
})

test("none at all is said plainly", () => {
	expect(shortSentence({ ...line, asked: 1, given: 0, keepsPrice: true })).toBe(
		"You asked for 1 case of Basswood section, clover, and get none this time. None can be ready for Tuesday, August 18.",
	)
})

test("the producer's own reason stands in, as a sentence", () => {
	const reason = "We gave one case each until the 18 were gone"
	expect(shortSentence({ ...line, reason })).toBe(
		"You asked for 4 cases of Basswood section, clover, and get 2. We gave one case each until the 18 were gone.",
	)
	expect(shortSentence({ ...line, reason: "Is the rest welcome next week? " })).toMatch(/next week\?$/)
	expect(shortSentence({ ...line, reason: "  " })).toMatch(/That is all that can be ready/)
})

test("a store that keeps the price of what it asked for is told so", () => {
	expect(shortSentence({ ...line, keepsPrice: true })).toMatch(/ You keep the price for 4 cases\.$/)
})

test("a line in full has nothing to explain", () => {
	expect(() => shortSentence({ ...line, given: 4 })).toThrow(RangeError)
	expect(() => shortSentence({ ...line, given: -1 })).toThrow(RangeError)
	expect(() => shortSentence({ ...line, given: 1.5 })).toThrow(RangeError)
})
