import { stripe } from "./stripe.server"

/** One visit to the hosted card page. `key` makes a repeated call find the first page instead of a second charge. */
export type CardPageVisit = {
	key: string
	amountCents: number
	title: string
	email: string
	/** Comes back in every event about the visit and its payment. */
	metadata: Record<string, string>
	paidUrl: string
	backUrl: string
}

/** Opens the card page and answers its address. Throws when the payment service does not answer. */
export async function openCardPage(visit: CardPageVisit): Promise<{ id: string; url: string }> {
	const session = await stripe().checkout.sessions.create(
		{
			mode: "payment",
			line_items: [
				{
					quantity: 1,
					price_data: { currency: "usd", unit_amount: visit.amountCents, product_data: { name: visit.title } },
				},
			],
			customer_email: visit.email,
			client_reference_id: visit.key,
			metadata: visit.metadata,
			payment_intent_data: { metadata: visit.metadata },
			success_url: visit.paidUrl,
			cancel_url: visit.backUrl,
		},
		{ idempotencyKey: `card-page-${visit.key}` },
	)
	if (!session.url) throw new Error("an open card page has an address")
	return { id: session.id, url: session.url }
}

/**
 * How a visit to the card page stands now: `open` with its address, `complete` when the person has paid (the event may
 * still be on its way), `expired` when nobody can pay there any more. Throws when the payment service does not answer.
 */
export async function findCardPage(
	sessionId: string,
): Promise<{ state: "open"; url: string } | { state: "complete" | "expired" }> {
	const session = await stripe().checkout.sessions.retrieve(sessionId)
	if (session.status === "open" && session.url) return { state: "open", url: session.url }
	return { state: session.status === "complete" ? "complete" : "expired" }
}
