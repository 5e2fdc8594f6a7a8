import fc from "fast-check"
import { describe, expect, test } from "vitest"
import {
	discountOn,
	layAsTold,
	layOldestFirst,
	type PayableInvoice,
	payableOn,
	refundableCents,
	takeBack,
} from "~/domain/payments/lay-payment"

const invoice = (more: Partial<PayableInvoice> = {}): PayableInvoice => ({
	id: "i1",
	number: "2026-0001",
	dueOn: "2026-09-12",
	openCents: 100_000,
	totalCents: 100_000,
	creditedCents: 0,
	takenDiscountCents: 0,
	discountUntil: "2026-08-23",
	discountBasisPoints: 200,
	...more,
})

describe("the discount for paying early", () => {
	test("is taken up to its last day and not after", () => {
		expect(payableOn(invoice(), "2026-08-23")).toBe(98_000)
		expect(payableOn(invoice(), "2026-08-24")).toBe(100_000)
	})

	test("is not given for what was credited", () => {
		expect(discountOn(invoice({ creditedCents: 40_000, openCents: 60_000 }), "2026-08-20")).toBe(1_200)
	})

	test("is taken by whoever pays the rest in time, for the whole", () => {
		const { parts } = layOldestFirst(50_000, [invoice()], "2026-08-15")
		expect(parts).toEqual([{ invoiceId: "i1", cents: 50_000, discountCents: 0 }])
		const rest = layOldestFirst(48_000, [invoice({ openCents: 50_000 })], "2026-08-20")
		expect(rest).toEqual({ parts: [{ invoiceId: "i1", cents: 48_000, discountCents: 2_000 }], onAccountCents: 0 })
	})

	test("leaves what was paid beyond it on account", () => {
		expect(layOldestFirst(100_000, [invoice()], "2026-08-20")).toEqual({
			parts: [{ invoiceId: "i1", cents: 98_000, discountCents: 2_000 }],
			onAccountCents: 2_000,
		})
	})

	test("is taken once, and never settles an invoice by itself", () => {
		expect(discountOn(invoice({ takenDiscountCents: 2_000, openCents: 500 }), "2026-08-20")).toBe(0)
		expect(discountOn(invoice({ openCents: 1_500 }), "2026-08-20")).toBe(0)
	})
})

describe("a payment as told", () => {
	test("goes to the invoices named, and what one needs no more stays on account", () => {
		const second = invoice({
			id: "i2",
			number: "2026-0002",
			openCents: 10_000,
			totalCents: 10_000,
			discountUntil: null,
		})
		const told = [
			{ invoiceId: "i2", cents: 15_000 },
			{ invoiceId: "gone", cents: 5_000 },
			{ invoiceId: "i1", cents: 20_000 },
		]
		expect(layAsTold(40_000, told, [invoice(), second], "2026-09-01")).toEqual({
			parts: [
				{ invoiceId: "i2", cents: 10_000, discountCents: 0 },
				{ invoiceId: "i1", cents: 20_000, discountCents: 0 },
			],
			onAccountCents: 10_000,
		})
	})

	test("is refused when it is no whole cents", () => {
		expect(() => layAsTold(-1, [], [], "2026-09-01")).toThrow(RangeError)
		expect(() => layOldestFirst(0.5, [invoice()], "2026-09-01")).toThrow(RangeError)
	})
})

test("what a bank returns is taken back from what was laid last, the discount with the last cent", () => {
	const laid = [
		{ invoiceId: "i1", cents: 98_000, discountCents: 2_000 },
		{ invoiceId: "i2", cents: 10_000, discountCents: 0 },
	]
	expect(takeBack(20_000, laid)).toEqual([
		{ invoiceId: "i2", cents: 10_000, discountCents: 0 },
		{ invoiceId: "i1", cents: 10_000, discountCents: 0 },
	])
	expect(takeBack(108_000, laid)).toContainEqual({ invoiceId: "i1", cents: 98_000, discountCents: 2_000 })
	expect(() => takeBack(108_001, laid)).toThrow(RangeError)
})

test("no more is given back than was paid less what went back or is about to", () => {
	const returns = [
		{ state: "done" as const, amountCents: 2_000 },
		{ state: "asked" as const, amountCents: 1_000 },
		{ state: "failed" as const, amountCents: 7_000 },
		{ state: "won" as const, amountCents: 9_000 },
	]
	expect(refundableCents({ amountCents: 10_000, returns })).toBe(7_000)
})

test("whatever is paid, laid and taken back, no cent is lost and no invoice is settled beyond what it has open", () => {
	const openInvoices = fc.array(
		fc.record({
			totalCents: fc.integer({ min: 1, max: 200_000 }),
			paidShare: fc.double({ min: 0, max: 0.99, noNaN: true }),
			basisPoints: fc.constantFrom(0, 100, 200, 10_000),
			day: fc.integer({ min: 10, max: 28 }),
		}),
		{ maxLength: 6 },
	)
	fc.assert(
		fc.property(
			openInvoices,
			fc.integer({ min: 0, max: 900_000 }),
			fc.double({ min: 0, max: 1, noNaN: true }),
			(given, paid, share) => {
				const invoices = given.map(({ totalCents, paidShare, basisPoints, day }, index) =>
					invoice({
						id: `i${index}`,
						number: `2026-${index}`,
						dueOn: `2026-09-${day}`,
						totalCents,
						openCents: totalCents - Math.floor(totalCents * paidShare),
						discountBasisPoints: basisPoints,
						discountUntil: basisPoints === 0 ? null : `2026-08-${day}`,
					}),
				)
				const { parts, onAccountCents } = layOldestFirst(paid, invoices, "2026-08-20")
				const laid = parts.reduce((sum, part) => sum + part.cents, 0)
				expect(laid + onAccountCents).toBe(paid)
				for (const { invoiceId, cents, discountCents } of parts) {
					const { openCents = 0 } = invoices.find(({ id }) => id === invoiceId) ?? {}
					expect(cents).toBeGreaterThan(0)
					expect(cents + discountCents).toBeLessThanOrEqual(openCents)
				}
				if (onAccountCents > 0) {
					for (const { id, openCents } of invoices) {
						const part = parts.find(({ invoiceId }) => invoiceId === id)
						expect((part?.cents ?? 0) + (part?.discountCents ?? 0)).toBe(openCents)
					}
				}
				const back = Math.floor(laid * share)
				expect(takeBack(back, parts).reduce((sum, part) => sum + part.cents, 0)).toBe(back)
			},
		),
	)
})
