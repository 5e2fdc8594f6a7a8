import { stripe } from "./stripe.server"

/**
 * Puts a payment on the card reader, for the customer to hold their card to. `key` names the sale and makes one payment
 * of repeated calls; `attempt` rises with each new try at it. Answers the payment's id. Throws when the service does not
 * answer or the reader is busy or away.
 */
export async function askForCard(sale: {
	readerId: string
	key: string
	attempt: number
	intentId: string | null
	amountCents: number
	metadata: Record<string, string>
}): Promise<string> {
	const intentId = sale.intentId ?? (await makeIntent(sale))
	await stripe().terminal.readers.processPaymentIntent(
		sale.readerId,
		{ payment_intent: intentId },
		{ idempotencyKey: `reader-${sale.key}-${sale.attempt}` },
	)
	return intentId
}

async function makeIntent(sale: {
	key: string
	amountCents: number
	metadata: Record<string, string>
}): Promise<string> {
	const intent = await stripe().paymentIntents.create(
		{
			amount: sale.amountCents,
			currency: "usd",
			allowed_payment_method_types: ["card_present"],
			capture_method: "automatic",
			metadata: sale.metadata,
		},
		{ idempotencyKey: `sale-${sale.key}` },
	)
	return intent.id
}

/** Takes a payment off the reader again and closes it, so that no card can pay it later. */
export async function stopAskingForCard(sale: { readerId: string; intentId: string | null }): Promise<void> {
	await stripe().terminal.readers.cancelAction(sale.readerId)
	if (sale.intentId) await stripe().paymentIntents.cancel(sale.intentId)
}
