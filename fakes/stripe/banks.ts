/** What comes of debiting a test account. A debit is on its way first; the bank's answer follows days later. */
export type BankOutcome = { kind: "clear" } | { kind: "return"; code: string; message: string }

/** All that is ever kept of an account. */
export type BankAccount = { bankName: string; last4: string; routingNumber: string }

const returned = (code: string, message: string): BankOutcome => ({ kind: "return", code, message })

/** Stripe's test accounts, from memory; the sentences are the fake's own. */
const outcomes: Record<string, BankOutcome> = {
	"000123456789": { kind: "clear" },
	"000111111113": returned("account_closed", "The customer's bank account has been closed."),
	"000111111116": returned("no_account", "The customer's bank account could not be located."),
	"000222222227": returned(
		"insufficient_funds",
		"The customer's account has insufficient funds to cover this payment.",
	),
	"000333333335": returned(
		"debit_not_authorized",
		"The customer has notified their bank that this debit was unauthorized.",
	),
}

export const TEST_ROUTING_NUMBER = "110000000"

/** What the test account with this number does; undefined for a number that is no test account. */
export function bankOutcomeOf(accountNumber: string): BankOutcome | undefined {
	return outcomes[accountNumber]
}

/** Bank and last four digits, the only trace of an account number that may be stored. */
export function describeAccount(accountNumber: string, routingNumber: string): BankAccount {
	return { bankName: "STRIPE TEST BANK", last4: accountNumber.slice(-4), routingNumber }
}
