import type { BookEvent, MoneyWay, ReturnState, ReturnWay } from "./entries"

const WAYS: Readonly<Record<MoneyWay, string>> = {
	card: "card",
	"bank-debit": "bank debit",
	cheque: "check",
	cash: "cash",
	transfer: "bank transfer",
}

const RETURNS: Readonly<Record<ReturnWay, Readonly<Record<ReturnState, string>>>> = {
	refund: { asked: "Refund asked for", done: "Refund", failed: "Refund failed", won: "Refund taken back" },
	"bank-return": {
		asked: "Bank debit asked back",
		done: "Bank debit returned",
		failed: "Return of a bank debit failed",
		won: "Return of a bank debit taken back",
	},
	dispute: {
		asked: "Payment disputed",
		done: "Dispute lost",
		failed: "Dispute withdrawn",
		won: "Dispute won",
	},
	bounced: {
		asked: "Check questioned",
		done: "Check bounced",
		failed: "Check honored after all",
		won: "Check honored after all",
	},
}

/** What an entry is about, in words: "Payment by check, 1207". `detail` is the reason or reference that was written. */
export function eventWords(event: BookEvent, detail = ""): string {
	const words = wordsOf(event)
	return detail ? `${words}, ${detail}` : words
}

function wordsOf(event: BookEvent): string {
	switch (event.kind) {
		case "invoice":
			return event.of === "goods" ? "Invoice" : "Finance charge"
		case "credit":
			return "Credit"
		case "payment":
			return `Payment by ${WAYS[event.method]}`
		case "discount":
			return event.amountCents < 0 ? "Discount taken back" : "Discount for paying early"
		case "write-off":
			return event.amountCents < 0 ? "Bad debt taken back" : "Bad debt"
		case "return":
			return RETURNS[event.way][event.to]
		case "payout":
			return "Paid out by Stripe"
		case "stall-sales":
			return event.method === "card" ? "Stall sales by card" : "Stall sales for cash"
	}
}
