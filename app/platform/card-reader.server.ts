import { log } from "./log.server"
import { stripe } from "./stripe.server"

/**
 * Opens a payment that a card at a reader can pay. `key` makes one payment of repeated calls. Answers the payment's id,
 * to be kept before a reader asks for it: what a card pays must be known. Throws when the service does not answer.
 */
export async function openReaderPayment(sale: {
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

/**
 * Puts a payment on the card reader, for the customer to hold their card to. `key` is another one for each new try, as
 * the service answers a known key with its earlier answer. `busy` when the reader asks for another payment: that one
 * stays, or its customer would pay this one. Throws when the service does not answer or the reader is away.
 */
export async function askForCard(payment: {
	readerId: string
	intentId: string
	key: string
}): Promise<"asked" | "busy"> {
	const asksFor = await paymentAtReader(payment.readerId)
	if (asksFor !== null && asksFor !== payment.intentId) return "busy"
	await stripe().terminal.readers.processPaymentIntent(
		payment.readerId,
		{ payment_intent: payment.intentId },
		{ idempotencyKey: `reader-${payment.key}` },
	)
	return "asked"
}

/** Whether the reader waits for a card for this payment just now. Throws when the service does not answer. */
export async function isAskingForCard(payment: { readerId: string; intentId: string }): Promise<boolean> {
	return (await paymentAtReader(payment.readerId)) === payment.intentId
}

/**
 * Closes a payment, so that no card can pay it later, and takes it off the reader if the reader still asks for it. A
 * reader that is away keeps nothing open: a closed payment takes no card. Throws when the payment cannot be closed:
 * because it was paid or is closed already, or because the service does not answer.
 */
export async function stopAskingForCard(payment: { readerId: string; intentId: string }): Promise<void> {
	try {
		if (await isAskingForCard(payment)) await stripe().terminal.readers.cancelAction(payment.readerId)
	} catch (error) {
		log.warn({ err: error, readerId: payment.readerId }, "the card reader could not be cleared")
	}
	await closePayment(payment.intentId)
}

/** Closes a payment that is on no reader any more. Throws as `stopAskingForCard` does. */
export async function closePayment(intentId: string): Promise<void> {
	await stripe().paymentIntents.cancel(intentId)
}

async function paymentAtReader(readerId: string): Promise<string | null> {
	const reader = await stripe().terminal.readers.retrieve(readerId)
	if (!("action" in reader) || reader.action?.status !== "in_progress") return null
	const intent = reader.action.process_payment_intent?.payment_intent
	return typeof intent === "object" ? intent.id : (intent ?? null)
}
