/** What a test card does when it is charged. The sentences are the ones Stripe shows for the same decline. */
export type CardOutcome =
	| { kind: "success" }
	| { kind: "authenticate" }
	| { kind: "decline"; code: string; declineCode: string; message: string }

/** All that is ever kept of a card. */
export type Card = { brand: string; last4: string; expMonth: number; expYear: number }

const declined = (code: string, declineCode: string, message: string): CardOutcome => ({
	kind: "decline",
	code,
	declineCode,
	message,
})

const genericDecline = declined("card_declined", "generic_decline", "Your card was declined.")

const outcomes: Record<string, CardOutcome> = {
	"4242424242424242": { kind: "success" },
	"5555555555554444": { kind: "success" },
	"378282246310005": { kind: "success" },
	"4000002760003184": { kind: "authenticate" },
	"4000000000000002": genericDecline,
	// Can be kept, and is declined each time it is charged afterwards.
	"4000000000000341": genericDecline,
	"4000000000009995": declined("card_declined", "insufficient_funds", "Your card has insufficient funds."),
	"4000000000000069": declined("expired_card", "expired_card", "Your card has expired."),
	"4000000000000127": declined("incorrect_cvc", "incorrect_cvc", "Your card's security code is incorrect."),
	"4000000000000119": declined(
		"processing_error",
		"processing_error",
		"An error occurred while processing your card. Try again in a little bit.",
	),
}

/** Stripe's names for test payment methods, by the card each stands for. */
const namedMethods: Record<string, string> = {
	pm_card_visa: "4242424242424242",
	pm_card_mastercard: "5555555555554444",
	pm_card_amex: "378282246310005",
	pm_card_chargeDeclined: "4000000000000002",
	pm_card_visa_chargeDeclined: "4000000000000002",
	pm_card_chargeDeclinedInsufficientFunds: "4000000000009995",
	pm_card_visa_chargeDeclinedInsufficientFunds: "4000000000009995",
	pm_card_chargeDeclinedExpiredCard: "4000000000000069",
	pm_card_chargeDeclinedProcessingError: "4000000000000119",
	pm_card_authenticationRequired: "4000002760003184",
	pm_card_chargeCustomerFail: "4000000000000341",
}

/** The card number behind a test payment method such as `pm_card_visa`; undefined for any other name. */
export function numberOfMethod(name: string): string | undefined {
	return namedMethods[name]
}

/** What the test card with this number does; undefined for a number that is no test card, which is never taken. */
export function outcomeOf(number: string): CardOutcome | undefined {
	return outcomes[number]
}

/** Whether the bank of this test card lets it be kept for later; what comes of a later charge is another matter. */
export function canBeKept(number: string): boolean {
	return number === "4000000000000341" || outcomes[number]?.kind !== "decline"
}

/** Brand and last four digits, the only trace of a number that may be stored. */
export function describeCard(number: string, expMonth: number, expYear: number): Card {
	const brand = number.startsWith("3") ? "amex" : number.startsWith("5") ? "mastercard" : "visa"
	return { brand, last4: number.slice(-4), expMonth, expYear }
}
