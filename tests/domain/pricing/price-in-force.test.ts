import fc from "fast-check"
import { describe, expect, test } from "vitest"
import {
	breaksForStore,
	caseCentsAfter,
	type DatedPrice,
	estimateCaseCents,
	pricesInForce,
	promotedCents,
	promotionInForce,
} from "~/domain/pricing/price-in-force"

const price = (minCases: number, caseCents: number, validFrom: string, more: Partial<DatedPrice> = {}): DatedPrice => ({
	minCases,
	caseCents,
	poundCents: null,
	validFrom,
	...more,
})

describe("which price holds", () => {
	const tier = [price(1, 11_400, "2026-01-01"), price(3, 10_800, "2026-01-01"), price(1, 12_000, "2026-08-14")]

	test("a new price holds from its day on, break by break, and alters no day before", () => {
		expect(pricesInForce(tier, "2026-08-13").map(({ caseCents }) => caseCents)).toEqual([11_400, 10_800])
		expect(pricesInForce(tier, "2026-08-14").map(({ caseCents }) => caseCents)).toEqual([12_000, 10_800])
		expect(pricesInForce(tier, "2025-12-31")).toEqual([])
	})

	test("a store's own price stands for the whole product, through its last day, and then its tier's again", () => {
		const own = [price(1, 9900, "2026-08-01", { validUntil: "2026-08-20" })]
		expect(breaksForStore({ own, tier }, "2026-08-20")).toEqual(own)
		expect(breaksForStore({ own, tier }, "2026-08-21").map(({ caseCents }) => caseCents)).toEqual([12_000, 10_800])
	})

	test("an own price that has ended does not bring back the one before it", () => {
		const own = [price(1, 9500, "2026-07-01"), price(1, 9900, "2026-08-01", { validUntil: "2026-08-10" })]
		expect(pricesInForce(own, "2026-08-11")).toEqual([])
	})

	test("of two promotions the larger comes off, on their first and last day too, and they are not added up", () => {
		const promotions = [
			{ basisPoints: 500, startsOn: "2026-08-01", endsOn: "2026-08-31" },
			{ basisPoints: 1000, startsOn: "2026-08-10", endsOn: "2026-08-12" },
		]
		const off = (day: string) => promotionInForce(promotions, day)
		expect([off("2026-07-31"), off("2026-08-01"), off("2026-08-10"), off("2026-08-12"), off("2026-08-13")]).toEqual([
			0, 500, 1000, 1000, 500,
		])
	})

	test("a reduced price is rounded once to whole cents, half a cent up, as exact fractions say", () => {
		expect(promotedCents(50, 100)).toBe(50)
		expect(promotedCents(150, 100)).toBe(149)
		expect(() => promotedCents(100, 10_001)).toThrow(RangeError)
		fc.assert(
			fc.property(fc.integer({ min: 0, max: 10_000_000 }), fc.integer({ min: 0, max: 10_000 }), (cents, off) => {
				const twice = BigInt(cents) * BigInt(10_000 - off) * 2n
				expect(BigInt(promotedCents(cents, off))).toBe((twice + 10_000n) / 20_000n)
			}),
		)
	})

	test("comb priced by weight is estimated from its nominal net weight at the reduced price of a pound", () => {
		const product = { pieceNetGrams: 340, piecesPerCase: 12 }
		// 12 × 340 g is 8.99486… lb; at $9.00 a pound $80.95.
		expect(estimateCaseCents(product, 900)).toBe(8095)
		expect(caseCentsAfter({ caseCents: 8095, poundCents: 900 }, product, 1000)).toEqual({
			caseCents: estimateCaseCents(product, 810),
			poundCents: 810,
		})
	})
})
