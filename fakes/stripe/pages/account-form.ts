import { bankOutcomeOf, TEST_ROUTING_NUMBER } from "../banks"
import type { GivenAccount } from "../debits"
import type { FormTree } from "../form"

export type AccountField = "email" | "routing" | "account" | "name"
export type AccountErrors = Partial<Record<AccountField, string>>

function text(form: FormTree, field: string): string {
	const value = form[field]
	return typeof value === "string" ? value.trim() : ""
}

/**
 * Reads the form for a debit. Answers the account, or one sentence per wrong field. A number that is no test account is
 * refused here, before anything is made of it.
 */
export function readAccountForm(
	form: FormTree,
	askedForEmail: boolean,
): {
	typed: { email: string; name: string }
	errors: AccountErrors
	account?: Omit<GivenAccount, "email">
} {
	const typed = { email: text(form, "email"), name: text(form, "name") }
	const routingNumber = text(form, "routing").replace(/[\s-]/g, "")
	const accountNumber = text(form, "account").replace(/[\s-]/g, "")
	const errors: AccountErrors = {}
	if (askedForEmail && !/^\S+@\S+\.\S+$/.test(typed.email)) errors.email = "Enter an e-mail address."
	if (routingNumber !== TEST_ROUTING_NUMBER) errors.routing = `Enter the test routing number, ${TEST_ROUTING_NUMBER}.`
	if (!accountNumber) errors.account = "Enter an account number."
	else if (!bankOutcomeOf(accountNumber)) {
		errors.account = "This is not one of the test accounts. Never type a real account here."
	}
	if (!typed.name) errors.name = "Enter the name on the account."
	if (Object.keys(errors).length > 0) return { typed, errors }
	return { typed, errors, account: { accountNumber, routingNumber, name: typed.name } }
}
