import { type Day, fullDay } from "~/domain/calendar"
import type { EntryKind } from "./statement"

/** What the words of a statement's line are made of. */
export type EntryFacts = {
	kind: EntryKind
	/** Of the invoice or credit itself, or of the invoice that a discount or a write-off is on. */
	number: string | null
	what: string | null
	dueOn: Day | null
	words: string
	cents: number
}

const PAID_BY: Readonly<Record<string, string>> = {
	card: "Paid by card",
	"bank-debit": "Paid by bank debit",
	cheque: "Paid by check",
	cash: "Paid in cash",
	transfer: "Paid by transfer",
}

const WENT_BACK: Readonly<Record<string, string>> = {
	refund: "Paid back to you",
	"bank-return": "Bank debit returned by the bank",
	dispute: "Card payment disputed and taken back",
	bounced: "Check that was not honored",
}

/** A line of a statement in words, as the store reads it: what it is, and what is to be known of it. */
export function entryWords({ kind, number, what, dueOn, words, cents }: EntryFacts): { name: string; note: string } {
	switch (kind) {
		case "invoice": {
			const due = dueOn ? `due ${fullDay(dueOn)}` : ""
			const about = what === "finance-charge" ? "charge for paying late" : words && `your number ${words}`
			return { name: `Invoice ${number}`, note: [due, about].filter(Boolean).join("; ") }
		}
		case "credit":
			return { name: `Credit ${number}`, note: words }
		case "payment":
			return { name: PAID_BY[what ?? ""] ?? "Paid", note: words }
		case "return":
			return { name: WENT_BACK[what ?? ""] ?? "Went back", note: words }
		case "discount":
			return { name: cents < 0 ? "Discount taken back" : "Discount for paying early", note: `invoice ${number}` }
		case "write-off":
			return { name: cents < 0 ? "Owed again" : "Given up", note: `invoice ${number}` }
	}
}
