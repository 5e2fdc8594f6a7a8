import fc from "fast-check"
import { expect, test } from "vitest"
import { dayTotals, saleTotals } from "~/domain/stall/sale-totals"

test("three pieces in a sale come to the price on the signs", () => {
	const sale = [
		{ productId: "round", pieces: 1, pieceCents: 1400 },
		{ productId: "basswood", pieces: 1, pieceCents: 1850 },
		{ productId: "cut-comb", pieces: 1, pieceCents: 1700 },
	]
	expect(saleTotals(sale)).toEqual({ pieces: 3, totalCents: 4950 })
	expect(saleTotals([])).toEqual({ pieces: 0, totalCents: 0 })
	expect(() => saleTotals([{ productId: "round", pieces: 0.5, pieceCents: 1400 }])).toThrow(RangeError)
})

test("the cash box should hold the float and the cash sales, less what was paid out", () => {
	const sales = [
		{ method: "card" as const, pieces: 2, totalCents: 2800 },
		{ method: "cash" as const, pieces: 1, totalCents: 1850 },
		{ method: "cash" as const, pieces: 1, totalCents: 1700 },
	]
	expect(dayTotals({ sales, floatCents: 10_000, paidOutCents: 500 })).toEqual({
		salesCount: 3,
		pieces: 4,
		cardCents: 2800,
		cashCents: 3550,
		totalCents: 6350,
		expectedCashCents: 13_050,
	})
	expect(() => dayTotals({ sales: [], floatCents: -1, paidOutCents: 0 })).toThrow(RangeError)
})

test("card and cash sum to the day, in whatever order the sales came in", () => {
	const sale = fc.record({
		method: fc.constantFrom("card" as const, "cash" as const),
		pieces: fc.nat(20),
		totalCents: fc.nat(50_000),
	})
	fc.assert(
		fc.property(fc.array(sale), (sales) => {
			const day = dayTotals({ sales, floatCents: 5000, paidOutCents: 0 })
			expect(day.cardCents + day.cashCents).toBe(sales.reduce((sum, one) => sum + one.totalCents, 0))
			expect(dayTotals({ sales: sales.toReversed(), floatCents: 5000, paidOutCents: 0 })).toEqual(day)
		}),
	)
})
