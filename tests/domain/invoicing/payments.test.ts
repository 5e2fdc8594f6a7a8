import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { addDays } from "~/domain/calendar"
import { ageing, ageingBucket } from "~/domain/invoicing/ageing"
import { allocatePayment, invoiceStanding, type OpenInvoice, standingWords } from "~/domain/invoicing/payments"

const invoice = (number: string, dueOn: string, openCents: number): OpenInvoice => ({
	id: `id-${number}`,
	number,
	dueOn,
	openCents,
})

describe("where a payment goes", () => {
	test("it settles the invoice due first, then the next, and the last in part", () => {
		const open = [
			invoice("2026-0010", "2026-09-15", 30_000),
			invoice("2026-0002", "2026-08-01", 68_400),
			invoice("2026-0003", "2026-09-01", 92_990),
		]
		expect(allocatePayment(100_000, open)).toEqual({
			parts: [
				{ invoiceId: "id-2026-0002", cents: 68_400 },
				{ invoiceId: "id-2026-0003", cents: 31_600 },
			],
			onAccountCents: 0,
		})
	})

	test("of invoices due on one day the lesser number goes first, counted as numbers", () => {
		const open = [invoice("2026-10000", "2026-09-01", 500), invoice("2026-9999", "2026-09-01", 500)]
		expect(allocatePayment(500, open).parts).toEqual([{ invoiceId: "id-2026-9999", cents: 500 }])
	})

	test("what is over stays on account, and settled invoices get nothing", () => {
		const open = [invoice("2026-0001", "2026-08-01", 0), invoice("2026-0002", "2026-08-02", 1000)]
		expect(allocatePayment(1500, open)).toEqual({
			parts: [{ invoiceId: "id-2026-0002", cents: 1000 }],
			onAccountCents: 500,
		})
		expect(allocatePayment(1500, [])).toEqual({ parts: [], onAccountCents: 1500 })
	})

	test("a negative payment throws", () => {
		expect(() => allocatePayment(-1, [])).toThrow(RangeError)
		expect(() => allocatePayment(0.5, [])).toThrow(RangeError)
	})

	test("nothing is lost, no invoice gets more than it has open, and none waits behind one due later", () => {
		const day = fc.integer({ min: 0, max: 60 }).map((ahead) => addDays("2026-08-01", ahead))
		const open = fc
			.array(fc.record({ dueOn: day, openCents: fc.nat(100_000) }), { maxLength: 8 })
			.map((list) => list.map((one, index) => invoice(`2026-000${index + 1}`, one.dueOn, one.openCents)))
		fc.assert(
			fc.property(open, fc.nat(500_000), (invoices, payment) => {
				const { parts, onAccountCents } = allocatePayment(payment, invoices)
				expect(parts.reduce((sum, part) => sum + part.cents, 0) + onAccountCents).toBe(payment)
				const paid = (id: string) => parts.find((part) => part.invoiceId === id)?.cents ?? 0
				for (const one of invoices) {
					expect(paid(one.id)).toBeLessThanOrEqual(one.openCents)
					const isUnsettled = paid(one.id) < one.openCents
					const paidLater = invoices.filter((other) => other.dueOn > one.dueOn && paid(other.id) > 0)
					if (isUnsettled) expect([...paidLater, onAccountCents]).toEqual([0])
				}
				expect(allocatePayment(payment, invoices.toReversed())).toEqual({ parts, onAccountCents })
			}),
		)
	})
})

describe("how an invoice stands", () => {
	const bill = { totalCents: 68_400, openCents: 68_400, dueOn: "2026-08-01" }

	test("it is late from the day after it was due", () => {
		expect(standingWords(invoiceStanding(bill, "2026-08-01"))).toBe("open")
		expect(standingWords(invoiceStanding(bill, "2026-08-02"))).toBe("open, 1 day late")
		expect(standingWords(invoiceStanding(bill, "2026-08-13"))).toBe("open, 12 days late")
	})

	test("a part payment leaves the rest open, and a paid invoice is never late", () => {
		const part = invoiceStanding({ ...bill, openCents: 8400 }, "2026-08-13")
		expect(part).toEqual({ state: "part-paid", openCents: 8400, daysLate: 12 })
		expect(standingWords(part)).toBe("part paid, 12 days late")
		expect(standingWords(invoiceStanding({ ...bill, openCents: 0 }, "2027-01-01"))).toBe("paid")
	})
})

describe("ageing", () => {
	test("an invoice stands in the column of its days past due", () => {
		expect([-5, 0, 1, 30, 31, 60, 61, 90, 91].map(ageingBucket)).toEqual([
			"current",
			"current",
			"1–30",
			"1–30",
			"31–60",
			"31–60",
			"61–90",
			"61–90",
			"over 90",
		])
	})

	test("every open cent stands in exactly one column", () => {
		const open = [
			{ dueOn: "2026-09-01", openCents: 92_990 },
			{ dueOn: "2026-08-01", openCents: 68_400 },
			{ dueOn: "2026-08-12", openCents: 100 },
			{ dueOn: "2026-01-01", openCents: 5 },
		]
		expect(ageing(open, "2026-08-13")).toEqual({
			current: 92_990,
			"1–30": 68_500,
			"31–60": 0,
			"61–90": 0,
			"over 90": 5,
		})
	})
})
