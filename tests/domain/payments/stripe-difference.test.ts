import { expect, test } from "vitest"
import { differenceOf, type OurPayment, type TheirPayment } from "~/domain/payments/stripe-difference"

const ours: OurPayment = { intentId: "pi_1", status: "paid", amountCents: 5_000, returnedCents: 0 }
const theirs: TheirPayment = { status: "paid", amountCents: 5_000, returnedCents: 0 }

test("two that agree, and what nobody has paid, are no difference", () => {
	expect(differenceOf("pi_1", ours, theirs)).toBeNull()
	expect(differenceOf("pi_1", null, { ...theirs, status: "not-paid" })).toBeNull()
	expect(differenceOf("pi_1", null, null)).toBeNull()
	expect(
		differenceOf("pi_1", { ...ours, status: "not-paid" }, { ...theirs, status: "not-paid", amountCents: 9 }),
	).toBeNull()
})

test("each kind of difference is told in words", () => {
	expect(differenceOf("pi_1", null, theirs)).toMatchObject({ kind: "missing-here", detail: "At Stripe it is paid." })
	expect(differenceOf("pi_1", ours, null)).toMatchObject({ kind: "missing-there", ourCents: 5_000, theirCents: null })
	expect(differenceOf("pi_1", { ...ours, status: "on-its-way" }, theirs)).toMatchObject({
		kind: "other-state",
		detail: "Here it is on its way, at Stripe paid.",
	})
	expect(differenceOf("pi_1", ours, { ...theirs, amountCents: 4_000 })).toMatchObject({ kind: "other-amount" })
	expect(differenceOf("pi_1", { ...ours, returnedCents: 700 }, { ...theirs, returnedCents: 1_200 })).toMatchObject({
		kind: "other-amount",
		ourCents: 700,
		theirCents: 1_200,
		detail: "Refunded here: $7.00. At Stripe: $12.00.",
	})
})

test("of a sale, whose refunds are not kept here, the refunds are not held against it", () => {
	expect(differenceOf("pi_1", { ...ours, returnedCents: null }, { ...theirs, returnedCents: 1_200 })).toBeNull()
})
