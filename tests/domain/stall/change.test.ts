import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { changeFor, likelyAmounts } from "~/domain/stall/change"

describe("change at the stall", () => {
	test("change is given in bills and coins, largest first", () => {
		const change = changeFor({ dueCents: 4950, givenCents: 6000 })
		expect(change).toEqual({
			ok: true,
			changeCents: 1050,
			parts: [
				{ cents: 1000, count: 1, sumCents: 1000, words: "one $10 bill" },
				{ cents: 25, count: 2, sumCents: 50, words: "two quarters" },
			],
		})
	})

	test("the exact amount needs no change", () => {
		expect(changeFor({ dueCents: 4950, givenCents: 4950 })).toEqual({ ok: true, changeCents: 0, parts: [] })
	})

	test("too little says how much more", () => {
		expect(changeFor({ dueCents: 4950, givenCents: 4700 })).toEqual({
			ok: false,
			reason: "too-little",
			shortCents: 250,
			words: "2.50 more",
		})
	})

	test("a hundred for a small sale comes back in twenties, since a float holds no fifties", () => {
		const change = changeFor({ dueCents: 950, givenCents: 10_000 })
		expect(change.ok && change.parts.map((part) => part.words)).toEqual([
			"four $20 bills",
			"one $10 bill",
			"two quarters",
		])
		const thousand = changeFor({ dueCents: 2000, givenCents: 100_000 })
		expect(thousand.ok && thousand.parts.map((part) => part.words)).toEqual(["49 $20 bills"])
	})

	test("parts of a cent throw", () => {
		expect(() => changeFor({ dueCents: 1.5, givenCents: 2 })).toThrow(RangeError)
		expect(() => changeFor({ dueCents: 1, givenCents: -2 })).toThrow(RangeError)
	})

	/** The fewest bills and coins that come to each amount up to `most`, tried out one by one. */
	function fewestPieces(most: number): number[] {
		const fewest = [0]
		for (let cents = 1; cents <= most; cents += 1) {
			const before = [2000, 1000, 500, 100, 25, 10, 5, 1].map(
				(piece) => fewest[cents - piece] ?? Number.POSITIVE_INFINITY,
			)
			fewest.push(1 + Math.min(...before))
		}
		return fewest
	}

	test("the parts come to the change, in as few pieces as there can be", () => {
		const fewest = fewestPieces(20_000)
		fc.assert(
			fc.property(fc.nat(20_000), fc.nat(20_000), (a, b) => {
				const [dueCents, givenCents] = a < b ? [a, b] : [b, a]
				const change = changeFor({ dueCents, givenCents })
				if (!change.ok) throw new Error("enough was given")
				expect(change.parts.reduce((sum, part) => sum + part.cents * part.count, 0)).toBe(givenCents - dueCents)
				expect(change.parts.reduce((sum, part) => sum + part.count, 0)).toBe(fewest[givenCents - dueCents])
			}),
		)
	})
})

describe("likely amounts", () => {
	test("the exact amount comes first, then round ones", () => {
		expect(likelyAmounts(4950)).toEqual([4950, 5000, 6000, 7000, 10_000])
		expect(likelyAmounts(1400)).toEqual([1400, 1500, 2000, 5000, 10_000])
		expect(likelyAmounts(2000)).toEqual([2000, 3000, 4000, 5000, 10_000])
		expect(likelyAmounts(0)).toEqual([])
	})

	test("every likely amount is enough, each is offered once, and they rise", () => {
		fc.assert(
			fc.property(fc.integer({ min: 1, max: 100_000 }), (dueCents) => {
				const amounts = likelyAmounts(dueCents)
				expect(amounts).toHaveLength(5)
				expect(amounts[0]).toBe(dueCents)
				expect(amounts).toEqual([...new Set(amounts)].toSorted((a, b) => a - b))
			}),
		)
	})
})
