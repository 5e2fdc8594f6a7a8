import { expect, test } from "vitest"
import { paymentWords, returnWords } from "~/domain/payments/payment-words"

const payment = { state: "settled" as const, amountCents: 100, settledCents: 100, returnedCents: 0 }

test("a payment says how it stands", () => {
	expect(paymentWords(payment)).toBe("settled")
	expect(paymentWords({ ...payment, state: "on-its-way", settledCents: 0 })).toBe("on its way")
	expect(paymentWords({ ...payment, state: "returned", settledCents: 0 })).toBe("came back")
	expect(paymentWords({ ...payment, settledCents: 60 })).toBe("part on account")
	expect(paymentWords({ ...payment, settledCents: 0 })).toBe("on account")
	expect(paymentWords({ ...payment, settledCents: 60, returnedCents: 30 })).toBe("part went back, part on account")
	expect(paymentWords({ ...payment, settledCents: 0, returnedCents: 100 })).toBe("went back")
})

test("a dispute that is lost says that the money is gone, and one that is open does not", () => {
	expect(returnWords("dispute", "done")).toBe("Disputed: the bank has taken the money")
	expect(returnWords("dispute", "done", true)).toBe("Dispute lost; the money is gone")
	expect(returnWords("dispute", "won")).toBe("Dispute won; the money is here again")
})
