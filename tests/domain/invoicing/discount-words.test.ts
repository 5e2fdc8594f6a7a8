import { expect, test } from "vitest"
import { discountWords, missedDiscountWords } from "~/domain/invoicing/discount-words"

const discount = { basisPoints: 200, cents: 1_860, untilOn: "2026-08-28" }

test("a discount is said with its sum and its last day, and what letting it go costs in a year", () => {
	expect(discountWords(discount)).toBe("2 % off, $18.60, if paid by August 28")
	// 2/10 net 30 is 37.24 % by the textbook.
	expect(missedDiscountWords({ issuedOn: "2026-08-18", dueOn: "2026-09-17", discount })).toBe(
		"Paying on September 17 instead costs as much as borrowing at 37 % a year.",
	)
	expect(missedDiscountWords({ issuedOn: "2026-08-18", dueOn: "2026-08-28", discount })).toBeNull()
})
