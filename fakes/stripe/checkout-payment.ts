import type Stripe from "stripe"
import { canBeKept, describeCard, outcomeOf } from "./cards"
import { type GivenAccount, methodOfAccount, startDebit } from "./debits"
import { invalidRequest } from "./errors"
import { fromPage } from "./events"
import type { Fake } from "./fake"
import { type Attempt, attempt, chargeCard, type GivenCard, openIntent, settleAuthentication } from "./payment-flow"
import { keptMethod, recordMethod } from "./payment-methods"
import type { Presented } from "./presented"
import { setUpMethod } from "./setup-intents"

/** The payment intent of a session; made at the first try, as Stripe does. */
function intentOf(fake: Fake, session: Stripe.Checkout.Session): Stripe.PaymentIntent {
	const known = fake.store.intents.get(String(session.payment_intent))
	if (known) return known
	const secret = fake.store.sessionSecrets.get(session.id)
	const intent = openIntent(
		fake,
		{
			amount: session.amount_total ?? 0,
			currency: session.currency ?? "usd",
			allowedTypes: isByDebit(session) ? ["us_bank_account"] : null,
			captureMethod: "automatic",
			customer: typeof session.customer === "string" ? session.customer : null,
			description: secret?.intentDescription ?? null,
			metadata: { ...secret?.intentMetadata },
			receiptEmail: null,
			automatic: false,
			futureUsage: secret?.futureUsage ?? null,
		},
		fromPage,
	)
	session.payment_intent = intent.id
	return intent
}

/** Whether the session takes debits of an account; else it takes cards. */
export function isByDebit(session: Stripe.Checkout.Session): boolean {
	return session.allowed_payment_method_types?.[0] === "us_bank_account"
}

/** The address a session knows for its payer: its own, or the customer's; null when the page has to ask. */
export function knownEmail(fake: Fake, session: Stripe.Checkout.Session): string | null {
	if (session.customer_email) return session.customer_email
	return fake.store.customers.get(String(session.customer))?.email ?? null
}

function complete(
	fake: Fake,
	session: Stripe.Checkout.Session,
	{ email, name }: { email: string | null; name: string | null },
	paymentStatus: Stripe.Checkout.Session.PaymentStatus = "paid",
): void {
	session.status = "complete"
	session.payment_status = paymentStatus
	session.url = null
	session.customer_details = {
		address: null,
		business_name: null,
		email,
		individual_name: null,
		name,
		phone: null,
		tax_exempt: "none",
		tax_ids: [],
	}
	fake.events.emit("checkout.session.completed", session, fromPage)
}

/**
 * Tries to pay an open session with a card typed on the page. Paid: the session is complete, with the events
 * charge.succeeded, payment_intent.succeeded, checkout.session.completed in that order. Declined: the session stays
 * open. Asked to authenticate: it stays open until the holder has answered.
 */
export function paySession(fake: Fake, session: Stripe.Checkout.Session, card: GivenCard): Attempt {
	const intent = intentOf(fake, session)
	const result = attempt(fake, intent, card, fromPage)
	if (result.kind === "paid") complete(fake, session, card)
	return result
}

/** Debits the account typed on the page: the session is complete and unpaid until the bank has answered. */
export function debitSession(fake: Fake, session: Stripe.Checkout.Session, account: GivenAccount): void {
	const { presented, method } = methodOfAccount(fake, account)
	startDebit(fake, intentOf(fake, session), presented, method, fromPage)
	complete(fake, session, account, "unpaid")
}

/** The kept methods that the page of a session offers: those of its customer, of its type, the latest first. */
export function offeredMethods(fake: Fake, session: Stripe.Checkout.Session): Stripe.PaymentMethod[] {
	if (session.mode !== "payment" || typeof session.customer !== "string") return []
	const type = isByDebit(session) ? "us_bank_account" : "card"
	return [...fake.store.methods.values()]
		.filter((method) => method.customer === session.customer && method.type === type)
		.reverse()
}

/** Pays a session with a kept method that its page offered. */
export function payWithKept(fake: Fake, session: Stripe.Checkout.Session, methodId: string): Attempt {
	const customer = typeof session.customer === "string" ? session.customer : null
	const { presented, behaviour } = keptMethod(fake, methodId, customer)
	const intent = intentOf(fake, session)
	if ("bank" in behaviour) {
		startDebit(fake, intent, presented, methodId, fromPage)
		complete(fake, session, presented, "unpaid")
		return { kind: "paid" }
	}
	const result = chargeCard(fake, intent, { outcome: behaviour.card, presented, method: methodId }, fromPage)
	if (result.kind === "paid") complete(fake, session, presented)
	return result
}

function keep(fake: Fake, session: Stripe.Checkout.Session, presented: Presented, method: string): void {
	const intent = setUpMethod(fake, {
		method,
		type: "bank" in presented ? "us_bank_account" : "card",
		customer: String(session.customer),
		metadata: { ...fake.store.sessionSecrets.get(session.id)?.setupMetadata },
	})
	session.setup_intent = intent.id
	complete(fake, session, presented, "no_payment_required")
}

/** Keeps the account typed on the page of a session in the mode setup. */
export function keepAccount(fake: Fake, session: Stripe.Checkout.Session, account: GivenAccount): void {
	const { presented, method } = methodOfAccount(fake, account)
	keep(fake, session, presented, method)
}

/** Keeps the card typed on the page of a session in the mode setup; refuses one whose bank would not have it kept. */
export function keepCard(fake: Fake, session: Stripe.Checkout.Session, given: GivenCard): void {
	const outcome = outcomeOf(given.number)
	if (!outcome || !canBeKept(given.number)) throw invalidRequest("Your card was declined.", { code: "card_declined" })
	const card = describeCard(given.number, given.expMonth, given.expYear)
	const presented: Presented = { card, name: given.name, email: given.email }
	keep(fake, session, presented, recordMethod(fake, presented, { card: outcome }))
}

/** The holder's answer on the authentication page, for an intent at requires_action; completes its session if it has one. */
export function answerAuthentication(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	approved: boolean,
): Stripe.Checkout.Session | undefined {
	const session = [...fake.store.sessions.values()].find((row) => row.payment_intent === intent.id)
	const payer = fake.store.waitingCards.get(intent.id)?.presented
	settleAuthentication(fake, intent, approved, fromPage)
	if (session && intent.status === "succeeded") complete(fake, session, payer ?? { email: null, name: null })
	return session
}
