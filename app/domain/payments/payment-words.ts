/** How money came in. */
export type PaymentMethod = "card" | "bank-debit" | "cheque" | "cash" | "transfer"

const METHOD_WORDS: Record<PaymentMethod, string> = {
	card: "card",
	"bank-debit": "bank debit",
	cheque: "check",
	cash: "cash",
	transfer: "bank transfer",
}

/** "check", "bank debit". */
export function methodWords(method: PaymentMethod): string {
	return METHOD_WORDS[method]
}

export type PaymentState = "on-its-way" | "settled" | "returned"

type Kept = { state: PaymentState; amountCents: number; settledCents: number; returnedCents: number }

/** How a payment stands: "on its way", "came back" before it had cleared, "went back", "part on account", "settled". */
export function paymentWords(payment: Kept): string {
	const { state, amountCents, settledCents, returnedCents } = payment
	if (state === "on-its-way") return "on its way"
	if (state === "returned") return "came back"
	if (returnedCents === amountCents) return "went back"
	const onAccount = amountCents - settledCents - returnedCents
	const parts = [
		...(returnedCents > 0 ? ["part went back"] : []),
		...(onAccount > 0 ? [settledCents > 0 ? "part on account" : "on account"] : []),
	]
	return parts.length > 0 ? parts.join(", ") : "settled"
}

export type ReturnKind = "refund" | "bank-return" | "dispute" | "bounced"
export type ReturnState = "asked" | "done" | "failed" | "won"

const RETURN_WORDS: Record<ReturnKind, Record<ReturnState, string>> = {
	refund: {
		asked: "Refund on its way",
		done: "Refunded",
		failed: "Refund that did not arrive; the money is here again",
		won: "Refunded",
	},
	"bank-return": {
		asked: "Being returned by the bank",
		done: "Returned by the bank",
		failed: "Returned by the bank, and given back",
		won: "Returned by the bank, and given back",
	},
	dispute: {
		asked: "The bank asks about it; nothing was taken",
		done: "Disputed: the bank has taken the money",
		failed: "Disputed, and given back",
		won: "Dispute won; the money is here again",
	},
	bounced: { asked: "Bounced", done: "Bounced", failed: "Bounced, and made good", won: "Bounced, and made good" },
}

/** What happened to a part of a payment that went back. `isLost`: the dispute is decided against the producer. */
export function returnWords(kind: ReturnKind, state: ReturnState, isLost = false): string {
	if (kind === "dispute" && state === "done" && isLost) return "Dispute lost; the money is gone"
	return RETURN_WORDS[kind][state]
}
