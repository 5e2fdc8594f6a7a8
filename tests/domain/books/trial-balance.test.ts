import fc from "fast-check"
import { expect, test } from "vitest"
import type { BookEvent } from "~/domain/books/entries"
import { addTotals, balanceOf, totalsOf, trialBalance } from "~/domain/books/trial-balance"
import { anyEvent } from "./money-events"

const sequence = fc.array(anyEvent, { maxLength: 60 })
const sum = (events: readonly BookEvent[], of: (event: BookEvent) => number) =>
	events.reduce((total, event) => total + of(event), 0)

/** 1 when the return has come to count, -1 when it has ceased to, 0 where neither. */
const turnsDone = (event: BookEvent & { kind: "return" }) => Number(event.to === "done") - Number(event.from === "done")
const isByStripe = (method: string) => method === "card" || method === "bank-debit"

test("the books balance after any sequence of events", () => {
	fc.assert(
		fc.property(sequence, sequence, (earlier, later) => {
			const balance = trialBalance(totalsOf(earlier), totalsOf(later))
			expect(balance.isBalanced).toBe(true)
			expect(balance.sum.debitCents).toBe(balance.sum.creditCents)
		}),
	)
})

test("what stores owe is invoices less credits and payments, with returns, less discounts and bad debt", () => {
	fc.assert(
		fc.property(sequence, (events) => {
			const owed = sum(events, (event) => {
				if (event.kind === "invoice") return event.linesCents + event.deliveryCents + event.taxCents
				if (event.kind === "credit") return -event.linesCents - event.taxCents
				if (event.kind === "payment" || event.kind === "discount" || event.kind === "write-off")
					return -event.amountCents
				return event.kind === "return" ? turnsDone(event) * event.amountCents : 0
			})
			expect(balanceOf(totalsOf(events), "receivable")).toBe(owed)
		}),
	)
})

test("what lies with Stripe is paid in less fees, money back and what was paid out", () => {
	fc.assert(
		fc.property(sequence, (events) => {
			const left = sum(events, (event) => {
				if (event.kind === "payment") return isByStripe(event.method) ? event.amountCents : 0
				if (event.kind === "stall-sales") return event.method === "card" ? event.totalCents : 0
				if (event.kind === "payout") return -(event.grossCents - event.feeCents) - event.feeCents
				if (event.kind !== "return" || !isByStripe(event.method)) return 0
				const isHeld = (state: string | null) => state === "done" || (state === "asked" && event.way === "dispute")
				return (Number(isHeld(event.from)) - Number(isHeld(event.to))) * event.amountCents
			})
			expect(balanceOf(totalsOf(events), "stripe")).toBe(left)
		}),
	)
})

test("what was invoiced is what is income, delivery and tax of invoices", () => {
	fc.assert(
		fc.property(fc.array(anyEvent.filter((event) => event.kind === "invoice")), (invoices) => {
			const totals = totalsOf(invoices)
			const income = (["sales", "finance-charges", "delivery-income", "sales-tax"] as const).map((account) =>
				balanceOf(totals, account),
			)
			expect(balanceOf(totals, "receivable") + income.reduce((all, cents) => all + cents, 0)).toBe(0)
		}),
	)
})

test("an event that stands for many of its kind gives the totals of all of them", () => {
	const invoice = fc.record({ linesCents: fc.nat(90_000), deliveryCents: fc.nat(2_000), taxCents: fc.nat(7_000) })
	fc.assert(
		fc.property(fc.array(invoice), (all) => {
			const events = all.map((amounts) => ({ kind: "invoice", of: "goods", ...amounts }) as const)
			const add = (key: "linesCents" | "deliveryCents" | "taxCents") => all.reduce((total, one) => total + one[key], 0)
			const together = {
				kind: "invoice",
				of: "goods",
				linesCents: add("linesCents"),
				deliveryCents: add("deliveryCents"),
				taxCents: add("taxCents"),
			} as const
			expect(totalsOf([together])).toEqual(totalsOf(events))
		}),
	)
})

test("the totals of two periods are those of both in one", () => {
	fc.assert(
		fc.property(sequence, sequence, (earlier, later) => {
			expect(addTotals(totalsOf(earlier), totalsOf(later))).toEqual(totalsOf([...earlier, ...later]))
		}),
	)
})

test("an account stands with what was on it before, what was entered and what is on it", () => {
	const before = totalsOf([{ kind: "payment", method: "cash", amountCents: 5_000 }])
	const entered = totalsOf([{ kind: "invoice", of: "goods", linesCents: 8_000, deliveryCents: 0, taxCents: 0 }])
	expect(trialBalance(before, entered).rows).toEqual([
		{ account: "cash", beforeCents: 5_000, debitCents: 0, creditCents: 0, afterCents: 5_000 },
		{ account: "receivable", beforeCents: -5_000, debitCents: 8_000, creditCents: 0, afterCents: 3_000 },
		{ account: "sales", beforeCents: 0, debitCents: 0, creditCents: 8_000, afterCents: -8_000 },
	])
})
