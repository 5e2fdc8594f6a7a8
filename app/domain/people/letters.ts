/** The kinds of letter that a person of a store may ask not to get, in the order in which the page offers them. */
export const letterKinds = ["confirmations", "changes", "messages", "reminders", "invoices"] as const
export type LetterKind = (typeof letterKinds)[number]

/** What each kind holds, as a store's people read it. */
export const LETTER_WORDS: Record<LetterKind, { name: string; holds: string }> = {
	confirmations: { name: "Confirmations and shortages", holds: "what will come, and what is short and why" },
	changes: { name: "Changes", holds: "a change to an order after it was confirmed, and what was answered" },
	messages: { name: "Messages", holds: "what the producer writes about an order" },
	reminders: { name: "Reminders", holds: "that last orders are near, or that an invoice is due" },
	invoices: { name: "Invoices and receipts", holds: "an invoice when the order is sent, a receipt when it is paid" },
}

/** Which kind a letter to a store belongs to, by its template. A template that is not named here is always sent. */
const KIND_OF: Readonly<Record<string, LetterKind>> = {
	"order-confirmed": "confirmations",
	"order-shared": "confirmations",
	"order-proposal": "changes",
	"order-changed": "changes",
	"order-message": "messages",
	"standing-order-reminder": "reminders",
	invoice: "invoices",
	"credit-issued": "invoices",
	"breakage-declined": "invoices",
	"payment-received": "invoices",
	statement: "invoices",
	reminder: "reminders",
	"certificate-expiring": "reminders",
}

/**
 * The kind of a letter, or null for one that cannot be switched off: signing in, an invitation, a withdrawal, and the
 * answer to what the person has just sent.
 */
export function letterKindOf(template: string): LetterKind | null {
	return Object.hasOwn(KIND_OF, template) ? (KIND_OF[template] ?? null) : null
}

/**
 * Who of a store's people is told: those who have not switched the kind off. When all have, it goes to all of them, since
 * somebody must know what comes and what is owed; reminders alone then go to nobody. This product's own rule.
 */
export function whoIsTold<Person extends { lettersOff: readonly string[] }>(
	people: readonly Person[],
	kind: LetterKind,
): Person[] {
	const willing = people.filter(({ lettersOff }) => !lettersOff.includes(kind))
	return willing.length > 0 || kind === "reminders" ? willing : [...people]
}
