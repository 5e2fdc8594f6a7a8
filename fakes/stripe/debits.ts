import type Stripe from "stripe"
import { recordBalance } from "./balance"
import { type BankAccount, type BankOutcome, bankOutcomeOf, describeAccount } from "./banks"
import { getCharge, recordCharge } from "./charges"
import { invalidRequest } from "./errors"
import { type Cause, fromPage } from "./events"
import type { Fake } from "./fake"
import { keepIfAsked } from "./payment-flow"
import { recordMethod } from "./payment-methods"
import type { Presented } from "./presented"

/** An account as it is given: the number is looked at once and never stored. */
export type GivenAccount = { accountNumber: string; routingNumber: string; name: string; email: string | null }

/** The method for an account typed on a page. Refuses a number that is no test account. */
export function methodOfAccount(fake: Fake, given: GivenAccount): { presented: Presented; method: string } {
	const outcome = bankOutcomeOf(given.accountNumber)
	if (!outcome) throw invalidRequest("Only Stripe's test accounts are taken here.", { code: "bank_account_unusable" })
	const bank: BankAccount = describeAccount(given.accountNumber, given.routingNumber)
	const presented: Presented = { name: given.name, email: given.email, bank }
	return { presented, method: recordMethod(fake, presented, { bank: outcome }) }
}

/** Starts to debit an account: the charge is pending and the intent processing (payment_intent.processing). */
export function startDebit(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	presented: Presented,
	method: string,
	cause: Cause,
): void {
	const charge = recordCharge(fake, intent, presented, method)
	keepIfAsked(fake, intent, method, cause)
	intent.latest_charge = charge.id
	intent.payment_method = method
	intent.last_payment_error = null
	intent.status = "processing"
	fake.events.emit("charge.pending", charge, cause)
	fake.events.emit("payment_intent.processing", intent, cause)
}

const returnedByBank: BankOutcome & { kind: "return" } = {
	kind: "return",
	code: "insufficient_funds",
	message: "The customer's account has insufficient funds to cover this payment.",
}

/**
 * The bank's answer to a debit that is on its way: as its test account has it, or as told. Cleared: charge.succeeded and
 * payment_intent.succeeded; returned: charge.failed and payment_intent.payment_failed; then the session's own event.
 */
export function settleDebit(fake: Fake, intent: Stripe.PaymentIntent, told?: "clear" | "return"): void {
	if (intent.status !== "processing") throw invalidRequest(`${intent.id} is not on its way.`)
	const behaviour = fake.store.behaviours.get(String(intent.payment_method))
	const own: BankOutcome = behaviour && "bank" in behaviour ? behaviour.bank : { kind: "clear" }
	const outcome = told === undefined || told === own.kind ? own : told === "clear" ? { kind: told } : returnedByBank
	const charge = getCharge(fake, String(intent.latest_charge))
	const session = [...fake.store.sessions.values()].find((row) => row.payment_intent === intent.id)
	if (outcome.kind === "clear") {
		charge.status = "succeeded"
		intent.status = "succeeded"
		intent.amount_received = intent.amount
		recordBalance(fake, charge)
		fake.events.emit("charge.succeeded", charge, fromPage)
		fake.events.emit("payment_intent.succeeded", intent, fromPage)
		if (!session) return
		session.payment_status = "paid"
		fake.events.emit("checkout.session.async_payment_succeeded", session, fromPage)
		return
	}
	charge.status = "failed"
	charge.paid = false
	charge.failure_code = outcome.code
	charge.failure_message = outcome.message
	intent.status = "requires_payment_method"
	intent.last_payment_error = {
		type: "invalid_request_error",
		charge: charge.id,
		code: outcome.code as Stripe.PaymentIntent.LastPaymentError["code"] & string,
		message: outcome.message,
	}
	fake.events.emit("charge.failed", charge, fromPage)
	fake.events.emit("payment_intent.payment_failed", intent, fromPage)
	if (session) fake.events.emit("checkout.session.async_payment_failed", session, fromPage)
}
