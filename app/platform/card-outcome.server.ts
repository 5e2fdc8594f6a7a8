import type Stripe from "stripe"
import { stripe } from "./stripe.server"

/** What became of a card payment, as it stands at Stripe now. */
export type CardOutcome = {
	state: "open" | "paid" | "declined" | "expired"
	intentId: string | null
	/** What was taken, in cents; 0 unless paid. */
	paidCents: number
	/** The bank's reason in words for a person; empty unless declined. */
	declineMessage: string
}

/** Asks Stripe for the current state of a payment. */
export async function findCardOutcome({ intentId }: { intentId: string }): Promise<CardOutcome> {
	return outcomeOf(await stripe().paymentIntents.retrieve(intentId))
}

function outcomeOf(intent: Stripe.PaymentIntent): CardOutcome {
	const base = { intentId: intent.id, paidCents: 0, declineMessage: "" }
	if (intent.status === "succeeded") return { ...base, state: "paid", paidCents: intent.amount_received }
	if (intent.status === "canceled") return { ...base, state: "expired" }
	const refused = intent.last_payment_error
	if (intent.status === "requires_payment_method" && refused)
		return { ...base, state: "declined", declineMessage: refused.message ?? "The card was refused." }
	return { ...base, state: "open" }
}
