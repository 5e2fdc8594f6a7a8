import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { formatMoney, percentOf, plainMoney, splitByLargestRemainder, weighedPriceCents } from "~/domain/money"

describe("money in words", () => {
	test("money has two decimals and commas in the thousands", () => {
		expect(formatMoney(111_800)).toBe("$1,118.00")
		expect(plainMoney(111_800)).toBe("1,118.00")
		expect(formatMoney(0)).toBe("$0.00")
		expect(formatMoney(5)).toBe("$0.05")
		expect(formatMoney(-5200)).toBe("-$52.00")
		expect(plainMoney(-123_456_789)).toBe("-1,234,567.89")
	})

	test("a fraction of a cent is never shown", () => {
		expect(() => formatMoney(10.5)).toThrow(RangeError)
		expect(() => formatMoney(Number.NaN)).toThrow(RangeError)
	})

	test("what is written can be read back to the same cents", () => {
		fc.assert(
			fc.property(fc.maxSafeInteger(), (cents) => {
				const read = BigInt(plainMoney(cents).replace(/[,.]/g, ""))
				expect(read).toBe(BigInt(cents))
			}),
		)
	})
})

describe("percentages", () => {
	test("half a cent goes up, and a credit mirrors its invoice", () => {
		expect(percentOf(10_000, 825)).toBe(825)
		expect(percentOf(50, 100)).toBe(1)
		expect(percentOf(49, 100)).toBe(0)
		expect(percentOf(-50, 100)).toBe(-1)
		expect(percentOf(-49, 100)).toBe(0)
	})

	test("a percentage is within half a cent of the exact figure", () => {
		fc.assert(
			fc.property(fc.integer({ min: -1e9, max: 1e9 }), fc.integer({ min: 0, max: 10_000 }), (cents, points) => {
				const exactTimes20000 = 2n * BigInt(cents) * BigInt(points)
				const off = 20_000n * BigInt(percentOf(cents, points)) - exactTimes20000
				expect(off <= 10_000n && off >= -10_000n).toBe(true)
				expect(percentOf(-cents, points)).toBe(0 - percentOf(cents, points))
			}),
		)
	})
})

describe("what is sold by weight", () => {
	test("weight times price is rounded once, half a cent up, whatever binary fractions say", () => {
		expect(weighedPriceCents(750, "lb/1000", 1798)).toBe(1349)
		expect(weighedPriceCents(1050, "lb/1000", 1450)).toBe(1523)
	})

	test("grams are turned to pounds by the exact pound", () => {
		expect(weighedPriceCents(453, "g", 1600)).toBe(1598)
		expect(weighedPriceCents(454, "g", 1600)).toBe(1601)
		expect(weighedPriceCents(0, "g", 1600)).toBe(0)
	})

	test("a negative or fractional weight throws", () => {
		expect(() => weighedPriceCents(-1, "g", 100)).toThrow(RangeError)
		expect(() => weighedPriceCents(0.75, "lb/1000", 1798)).toThrow(RangeError)
	})

	test("more weight never costs less", () => {
		const weight = fc.nat(100_000)
		fc.assert(
			fc.property(
				weight,
				weight,
				fc.nat(10_000),
				fc.constantFrom("g" as const, "lb/1000" as const),
				(a, b, price, unit) => {
					const [lighter, heavier] = a < b ? [a, b] : [b, a]
					expect(weighedPriceCents(lighter, unit, price)).toBeLessThanOrEqual(weighedPriceCents(heavier, unit, price))
				},
			),
		)
	})
})

describe("splitting by largest remainder", () => {
	const weights = fc.array(fc.nat(1_000_000), { minLength: 1, maxLength: 12 }).filter((list) => list.some((w) => w > 0))

	test("the cent that is left goes to the largest remainder, the earlier line on ties", () => {
		expect(splitByLargestRemainder(100, [1, 1, 1])).toEqual([34, 33, 33])
		expect(splitByLargestRemainder(24, [10, 15, 7, 9])).toEqual([6, 9, 4, 5])
		expect(splitByLargestRemainder(-100, [1, 1, 1])).toEqual([-34, -33, -33])
		expect(splitByLargestRemainder(0, [0, 0])).toEqual([0, 0])
	})

	test("cents cannot be split over lines that weigh nothing", () => {
		expect(() => splitByLargestRemainder(1, [0, 0])).toThrow(RangeError)
		expect(() => splitByLargestRemainder(1, [])).toThrow(RangeError)
		expect(() => splitByLargestRemainder(1, [-1, 2])).toThrow(RangeError)
	})

	test("the parts sum to the whole and each is within one cent of its exact share", () => {
		fc.assert(
			fc.property(fc.integer({ min: -1e9, max: 1e9 }), weights, (total, list) => {
				const parts = splitByLargestRemainder(total, list)
				const sum = list.reduce((a, b) => a + b, 0)
				expect(parts.reduce((a, b) => a + b, 0)).toBe(total)
				for (const [index, part] of parts.entries()) {
					const off = BigInt(part) * BigInt(sum) - BigInt(total) * BigInt(list[index] ?? 0)
					expect(off < BigInt(sum) && off > -BigInt(sum)).toBe(true)
				}
			}),
		)
	})

	test("turning the lines round moves no line by more than the one cent of a tie", () => {
		fc.assert(
			fc.property(fc.nat(100_000), weights, (total, list) => {
				const forward = splitByLargestRemainder(total, list)
				const backward = splitByLargestRemainder(total, list.toReversed()).toReversed()
				for (const [index, part] of forward.entries())
					expect(Math.abs(part - (backward[index] ?? 0))).toBeLessThanOrEqual(1)
			}),
		)
	})
})
