import { expect, test } from "vitest"
import { mondayOf, moneyByWeek } from "~/domain/books/dated-event"
import { eventWords } from "~/domain/books/event-words"
import { monthOf, monthsAround, periodWords, yearOf } from "~/domain/books/period"

test("a period is called as people call it", () => {
	expect(periodWords(monthOf("2026-02-11"))).toBe("February 2026")
	expect(periodWords(yearOf("2026-02-11"))).toBe("the year 2026")
	expect(periodWords({ from: "2026-08-04", to: "2026-09-02" })).toBe("August 4 to September 2, 2026")
	expect(periodWords({ from: "2025-12-30", to: "2026-01-02" })).toBe("December 30, 2025 to January 2, 2026")
	expect(periodWords({ from: "2026-08-04", to: "2026-08-04" })).toBe("August 4, 2026")
})

test("the month before and the month after, also over the turn of the year", () => {
	expect(monthsAround(monthOf("2026-01-15"))).toEqual({
		earlier: { from: "2025-12-01", to: "2025-12-31" },
		later: { from: "2026-02-01", to: "2026-02-28" },
	})
})

test("money moves by weeks that begin on Monday, and what goes to the bank is neither in nor out", () => {
	expect(mondayOf("2026-08-09")).toBe("2026-08-03")
	const weeks = moneyByWeek(
		[
			{ on: "2026-08-09", event: { kind: "payment", method: "card", amountCents: 10_000 } },
			{ on: "2026-08-10", event: { kind: "payout", grossCents: 10_000, feeCents: 320 } },
			{ on: "2026-08-10", event: { kind: "invoice", of: "goods", linesCents: 500, deliveryCents: 0, taxCents: 0 } },
		],
		{ from: "2026-08-07", to: "2026-08-12" },
	)
	expect(weeks).toEqual([
		{ weekOn: "2026-08-03", inCents: 10_000, outCents: 0 },
		{ weekOn: "2026-08-10", inCents: 0, outCents: 320 },
	])
})

test("an entry says what it is about", () => {
	expect(eventWords({ kind: "credit", linesCents: 1, taxCents: 0 }, "two combs broken")).toBe(
		"Credit, two combs broken",
	)
	expect(eventWords({ kind: "discount", amountCents: -1 })).toBe("Discount taken back")
	expect(eventWords({ kind: "payment", method: "cheque", amountCents: 1 })).toBe("Payment by check")
})
