import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { type BookEvent, entriesOf } from "~/domain/books/entries"
import { anyEvent } from "./money-events"

/** "receivable 110.00 | sales -100.00": debits above zero, credits below. */
const shown = (event: BookEvent) =>
	entriesOf(event)
		.map(({ account, debitCents, creditCents }) => `${account} ${((debitCents - creditCents) / 100).toFixed(2)}`)
		.join(" | ")

// The accounts of each entry as textbooks of double entry have them, from memory.
describe("what is entered for each event", () => {
	test("an invoice is owed whole, and divides into goods, delivery and tax", () => {
		const invoice = { kind: "invoice", of: "goods", linesCents: 10_000, deliveryCents: 1_800, taxCents: 825 } as const
		expect(shown(invoice)).toBe("receivable 126.25 | sales -100.00 | delivery-income -18.00 | sales-tax -8.25")
	})

	test("a charge for paying late is income of its own", () => {
		const charge = { kind: "invoice", of: "finance-charge", linesCents: 150, deliveryCents: 0, taxCents: 0 } as const
		expect(shown(charge)).toBe("receivable 1.50 | finance-charges -1.50")
	})

	test("a credit leaves the sales as they were and takes tax and debt back", () => {
		const credit = { kind: "credit", linesCents: 2_000, taxCents: 165 } as const
		expect(shown(credit)).toBe("credits-given 20.00 | sales-tax 1.65 | receivable -21.65")
	})

	test.each([
		["card", "stripe"],
		["bank-debit", "stripe"],
		["cheque", "bank"],
		["transfer", "bank"],
		["cash", "cash"],
	] as const)("a payment by %s lies on %s", (method, place) => {
		expect(shown({ kind: "payment", method, amountCents: 5_000 })).toBe(`${place} 50.00 | receivable -50.00`)
	})

	test("a discount and bad debt are costs, and turn when they are taken back", () => {
		expect(shown({ kind: "discount", amountCents: 200 })).toBe("discount-given 2.00 | receivable -2.00")
		expect(shown({ kind: "discount", amountCents: -200 })).toBe("receivable 2.00 | discount-given -2.00")
		expect(shown({ kind: "write-off", amountCents: 9_900 })).toBe("bad-debt 99.00 | receivable -99.00")
	})

	test("a refund is entered when it is done, and given back when it fails afterwards", () => {
		const refund = { kind: "return", way: "refund", method: "card", amountCents: 500 } as const
		expect(shown({ ...refund, from: null, to: "asked" })).toBe("")
		expect(shown({ ...refund, from: "asked", to: "done" })).toBe("receivable 5.00 | stripe -5.00")
		expect(shown({ ...refund, from: "done", to: "failed" })).toBe("stripe 5.00 | receivable -5.00")
	})

	test("a debit that the bank returned and a check that bounced are owed again", () => {
		const back = { kind: "return", from: null, to: "done", amountCents: 700 } as const
		expect(shown({ ...back, way: "bank-return", method: "bank-debit" })).toBe("receivable 7.00 | stripe -7.00")
		expect(shown({ ...back, way: "bounced", method: "cheque" })).toBe("receivable 7.00 | bank -7.00")
	})

	test("a dispute takes the money aside; lost, the store owes again; won, Stripe gives it back", () => {
		const dispute = { kind: "return", way: "dispute", method: "card", amountCents: 4_000 } as const
		expect(shown({ ...dispute, from: null, to: "asked" })).toBe("disputes 40.00 | stripe -40.00")
		expect(shown({ ...dispute, from: "asked", to: "done" })).toBe("receivable 40.00 | disputes -40.00")
		expect(shown({ ...dispute, from: "asked", to: "won" })).toBe("stripe 40.00 | disputes -40.00")
		expect(shown({ ...dispute, from: "done", to: "won" })).toBe("stripe 40.00 | receivable -40.00")
	})

	test("a payout brings the rest to the bank and leaves the fees as a cost", () => {
		const payout = { kind: "payout", grossCents: 10_000, feeCents: 320 } as const
		expect(shown(payout)).toBe("bank 96.80 | card-fees 3.20 | stripe -100.00")
	})

	test("the price at the stall contains the tax", () => {
		const sales = { kind: "stall-sales", method: "cash", totalCents: 10_825, taxCents: 825 } as const
		expect(shown(sales)).toBe("cash 108.25 | sales -100.00 | sales-tax -8.25")
		expect(shown({ ...sales, method: "card", taxCents: 0 })).toBe("stripe 108.25 | sales -108.25")
	})

	test.each<BookEvent>([
		{ kind: "payment", method: "cash", amountCents: -1 },
		{ kind: "credit", linesCents: 0.5, taxCents: 0 },
		{ kind: "stall-sales", method: "cash", totalCents: 100, taxCents: 101 },
	])("%o is refused", (event) => {
		expect(() => entriesOf(event)).toThrow(RangeError)
	})
})

test("debits equal credits for any event, and no line is of nothing or of both", () => {
	fc.assert(
		fc.property(anyEvent, (event) => {
			const lines = entriesOf(event)
			expect(lines.reduce((sum, line) => sum + line.debitCents - line.creditCents, 0)).toBe(0)
			for (const { debitCents, creditCents } of lines) {
				expect(Math.min(debitCents, creditCents)).toBe(0)
				expect(Math.max(debitCents, creditCents)).toBeGreaterThan(0)
			}
			expect(new Set(lines.map(({ account }) => account)).size).toBe(lines.length)
		}),
		{ numRuns: 1_000 },
	)
})
