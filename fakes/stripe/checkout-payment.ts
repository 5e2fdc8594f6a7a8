import type Stripe from "stripe"
import { fromPage } from "./events"
import type { Fake } from "./fake"
import { type Attempt, attempt, type GivenCard, openIntent, settleAuthentication } from "./payment-flow"

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
			allowedTypes: null,
			captureMethod: "automatic",
			customer: typeof session.customer === "string" ? session.customer : null,
			description: secret?.intentDescription ?? null,
			metadata: { ...secret?.intentMetadata },
			receiptEmail: null,
			automatic: false,
		},
		fromPage,
	)
	session.payment_intent = intent.id
	return intent
}

/** The address a session knows for its payer: its own, or the customer's; null when the page has to ask. */
export function knownEmail(fake: Fake, session: Stripe.Checkout.Session): string | null {
	if (session.customer_email) return session.customer_email
	return fake.store.customers.get(String(session.customer))?.email ?? null
}

function complete(fake: Fake, session: Stripe.Checkout.Session, email: string | null, name: string | null): void {
	session.status = "complete"
	session.payment_status = "paid"
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
	if (result.kind === "paid") complete(fake, session, card.email, card.name)
	return result
}

/** The holder's answer on the authentication page, for an intent at requires_action; completes its session if it has one. */
export function answerAuthentication(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	approved: boolean,
): Stripe.Checkout.Session | undefined {
	const session = [...fake.store.sessions.values()].find((row) => row.payment_intent === intent.id)
	const payer = fake.store.waitingCards.get(intent.id)
	settleAuthentication(fake, intent, approved, fromPage)
	if (session && intent.status === "succeeded") complete(fake, session, payer?.email ?? null, payer?.name ?? null)
	return session
}
