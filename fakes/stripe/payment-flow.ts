import type Stripe from "stripe"
import { type CardOutcome, describeCard, outcomeOf } from "./cards"
import { type Decline, recordCharge } from "./charges"
import { invalidRequest } from "./errors"
import type { Cause } from "./events"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { attachMethod, recordMethod } from "./payment-methods"
import type { Presented } from "./presented"

/** What came of an attempt to pay. `message` is the sentence for the person with the card. */
export type Attempt =
	| { kind: "paid" }
	| { kind: "authenticate"; url: string }
	| { kind: "declined"; code: string; declineCode: string; message: string; charge: string }

/** A card as it is given: the number is looked at once and never stored. */
export type GivenCard = { number: string; expMonth: number; expYear: number; name: string | null; email: string | null }

type IntentDraft = {
	amount: number
	currency: string
	/** What the caller lets the payer use; null leaves it to Stripe, which for this fake means a card. */
	allowedTypes: ("card" | "card_present" | "us_bank_account")[] | null
	captureMethod: "automatic" | "manual"
	customer: string | null
	description: string | null
	metadata: Record<string, string>
	receiptEmail: string | null
	automatic: boolean
	/** Set when the method is kept for charges without its owner. */
	futureUsage: "off_session" | null
}

/** A new payment intent that waits for a card; recorded and told of (payment_intent.created). */
export function openIntent(fake: Fake, draft: IntentDraft, cause: Cause): Stripe.PaymentIntent {
	const id = newId("pi")
	const intent: Stripe.PaymentIntent = {
		id,
		object: "payment_intent",
		allowed_payment_method_types: draft.allowedTypes,
		amount: draft.amount,
		amount_capturable: 0,
		amount_received: 0,
		application: null,
		application_fee_amount: null,
		automatic_payment_methods: draft.automatic ? { allow_redirects: "always", enabled: true } : null,
		canceled_at: null,
		cancellation_reason: null,
		capture_method: draft.captureMethod,
		client_secret: newId(`${id}_secret`),
		confirmation_method: "automatic",
		created: fake.seconds(),
		currency: draft.currency,
		customer: draft.customer,
		customer_account: null,
		description: draft.description,
		excluded_payment_method_types: null,
		last_payment_error: null,
		latest_charge: null,
		livemode: false,
		managed_payments: null,
		metadata: draft.metadata,
		next_action: null,
		on_behalf_of: null,
		payment_method: null,
		payment_method_configuration_details: null,
		payment_method_options: {},
		payment_method_types: draft.allowedTypes ?? ["card"],
		payment_record: null,
		processing: null,
		receipt_email: draft.receiptEmail,
		review: null,
		setup_future_usage: draft.futureUsage,
		shipping: null,
		source: null,
		statement_descriptor: null,
		statement_descriptor_suffix: null,
		status: "requires_payment_method",
		transfer_data: null,
		transfer_group: null,
	}
	fake.store.intents.set(id, intent)
	fake.events.emit("payment_intent.created", intent, cause)
	return intent
}

/** Takes the money of an intent whose card is good: succeeded, or requires_capture when capture is manual. */
function succeed(fake: Fake, intent: Stripe.PaymentIntent, presented: Presented, method: string, cause: Cause): void {
	const charge = recordCharge(fake, intent, presented, method)
	keepIfAsked(fake, intent, method, cause)
	intent.latest_charge = charge.id
	intent.payment_method = charge.payment_method
	intent.last_payment_error = null
	intent.next_action = null
	fake.events.emit("charge.succeeded", charge, cause)
	if (charge.captured) {
		intent.status = "succeeded"
		intent.amount_received = intent.amount
		fake.events.emit("payment_intent.succeeded", intent, cause)
	} else {
		intent.status = "requires_capture"
		intent.amount_capturable = intent.amount
		fake.events.emit("payment_intent.amount_capturable_updated", intent, cause)
	}
}

/** Attaches the method to the intent's customer when the intent says that it is kept. */
export function keepIfAsked(fake: Fake, intent: Stripe.PaymentIntent, method: string, cause: Cause): void {
	const customer = typeof intent.customer === "string" ? intent.customer : null
	if (customer && intent.setup_future_usage === "off_session") attachMethod(fake, method, customer, cause)
}

function decline(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	presented: Presented,
	method: string,
	why: Decline,
	cause: Cause,
): Attempt & { kind: "declined" } {
	const charge = recordCharge(fake, intent, presented, method, why)
	intent.latest_charge = charge.id
	intent.status = "requires_payment_method"
	intent.next_action = null
	intent.last_payment_error = {
		type: "card_error",
		charge: charge.id,
		code: why.code,
		decline_code: why.declineCode,
		message: why.message,
	}
	fake.events.emit("charge.failed", charge, cause)
	fake.events.emit("payment_intent.payment_failed", intent, cause)
	return { kind: "declined", charge: charge.id, code: why.code, declineCode: why.declineCode, message: why.message }
}

/**
 * Tries to pay `intent` with a test card and moves it on, with the events that Stripe sends in that order. A card that
 * wants authentication leaves it at requires_action with an address where the holder decides; `returnTo` is where that
 * page leads afterwards. Refuses a number that is no test card.
 */
export function attempt(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	given: GivenCard,
	cause: Cause,
	more: { reader?: string; returnTo?: string } = {},
): Attempt {
	const outcome = outcomeOf(given.number)
	if (!outcome) {
		throw invalidRequest("Only Stripe's test card numbers are taken here.", { code: "incorrect_number" })
	}
	const card = describeCard(given.number, given.expMonth, given.expYear)
	const presented: Presented = { card, name: given.name, email: given.email }
	if (more.reader !== undefined) presented.reader = more.reader
	const method = more.reader === undefined ? recordMethod(fake, presented, { card: outcome }) : newId("pm")
	return chargeCard(fake, intent, { outcome, presented, method }, cause, more)
}

const mustAuthenticate: Decline = {
	kind: "decline",
	code: "authentication_required",
	declineCode: "authentication_required",
	message: "Your card was declined. This transaction requires authentication.",
}

/** Tries to pay `intent` with a card whose number is not at hand any more. `offSession`: its holder cannot be asked. */
export function chargeCard(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	given: { outcome: CardOutcome; presented: Presented; method: string },
	cause: Cause,
	more: { reader?: string; returnTo?: string; offSession?: boolean } = {},
): Attempt {
	const { outcome, presented, method } = given
	fake.store.waitingCards.delete(intent.id)
	if (outcome.kind === "decline") return decline(fake, intent, presented, method, outcome, cause)
	// A chip read by a reader is authenticated there and then.
	if (outcome.kind === "success" || more.reader !== undefined) {
		succeed(fake, intent, presented, method, cause)
		return { kind: "paid" }
	}
	if (more.offSession) return decline(fake, intent, presented, method, mustAuthenticate, cause)
	const url = `${fake.url}/authenticate/${intent.id}`
	intent.status = "requires_action"
	intent.payment_method = method
	intent.next_action = { type: "redirect_to_url", redirect_to_url: { url, return_url: more.returnTo ?? null } }
	fake.store.waitingCards.set(intent.id, { presented, method })
	fake.events.emit("payment_intent.requires_action", intent, cause)
	return { kind: "authenticate", url }
}

/** The card holder's answer on the authentication page. The intent must be at requires_action. */
export function settleAuthentication(fake: Fake, intent: Stripe.PaymentIntent, approved: boolean, cause: Cause): void {
	const waiting = fake.store.waitingCards.get(intent.id)
	fake.store.waitingCards.delete(intent.id)
	if (approved && waiting) {
		succeed(fake, intent, waiting.presented, waiting.method, cause)
		return
	}
	intent.status = "requires_payment_method"
	intent.payment_method = null
	intent.next_action = null
	intent.last_payment_error = {
		type: "invalid_request_error",
		code: "payment_intent_authentication_failure",
		message:
			"We are unable to authenticate your payment method. Please choose a different payment method and try again.",
	}
	fake.events.emit("payment_intent.payment_failed", intent, cause)
}
