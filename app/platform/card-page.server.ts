import type Stripe from "stripe"
import { stripe } from "./stripe.server"

type PayMethod = "card" | "bank-debit"

const TYPE_OF = { card: "card", "bank-debit": "us_bank_account" } as const

/** One visit to the hosted page. `key` makes a repeated call find the first page instead of a second charge. */
type Visit = {
	key: string
	method: PayMethod
	/** Comes back in every event about the visit and its payment. */
	metadata: Record<string, string>
	doneUrl: string
	backUrl: string
}

export type PayVisit = Visit & {
	amountCents: number
	title: string
	email: string
	/** Whose kept ways to pay the page offers; null while nothing is kept. */
	customerId: string | null
}

async function openPage(
	key: string,
	params: Stripe.Checkout.SessionCreateParams,
): Promise<{ id: string; url: string }> {
	const session = await stripe().checkout.sessions.create(params, { idempotencyKey: `card-page-${key}` })
	if (!session.url) throw new Error("an open page has an address")
	return { id: session.id, url: session.url }
}

const frameOf = ({ key, method, metadata, doneUrl, backUrl }: Visit) => ({
	allowed_payment_method_types: [TYPE_OF[method]],
	client_reference_id: key,
	metadata,
	success_url: doneUrl,
	cancel_url: backUrl,
})

/** Opens the page where a card or a bank account pays, and answers its address. Throws when the service does not answer. */
export function openPayPage(visit: PayVisit): Promise<{ id: string; url: string }> {
	const { amountCents, title, email, customerId, metadata } = visit
	return openPage(visit.key, {
		...frameOf(visit),
		mode: "payment",
		line_items: [
			{ quantity: 1, price_data: { currency: "usd", unit_amount: amountCents, product_data: { name: title } } },
		],
		...(customerId
			? { customer: customerId, saved_payment_method_options: { allow_redisplay_filters: ["always", "limited"] } }
			: { customer_email: email }),
		payment_intent_data: { description: title, metadata },
	})
}

/** Opens the page where a card or a bank account is kept for a customer, and nothing is charged. Throws as `openPayPage`. */
export function openKeepPage(visit: Visit & { customerId: string }): Promise<{ id: string; url: string }> {
	return openPage(visit.key, {
		...frameOf(visit),
		mode: "setup",
		currency: "usd",
		customer: visit.customerId,
		setup_intent_data: { metadata: visit.metadata },
	})
}

/**
 * How a visit to a hosted page stands now: `open` with its address, `complete` when the person is done there (the event
 * may still be on its way), `expired` when nobody can pay there any more. Throws when the payment service does not answer.
 */
export async function findPayPage(
	sessionId: string,
): Promise<{ state: "open"; url: string } | { state: "complete" | "expired" }> {
	const session = await stripe().checkout.sessions.retrieve(sessionId)
	if (session.status === "open" && session.url) return { state: "open", url: session.url }
	return { state: session.status === "complete" ? "complete" : "expired" }
}

/** Closes a page so that nobody pays there any more; answers how it stands afterwards. Throws as `findPayPage`. */
export async function closePayPage(sessionId: string): Promise<"complete" | "expired"> {
	const page = await findPayPage(sessionId)
	if (page.state !== "open") return page.state
	await stripe()
		.checkout.sessions.expire(sessionId)
		.catch(() => undefined)
	const after = await findPayPage(sessionId)
	if (after.state === "open") throw new Error("a page that was closed is still open")
	return after.state
}
