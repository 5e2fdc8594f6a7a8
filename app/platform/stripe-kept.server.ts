import Stripe from "stripe"
import { stripe } from "./stripe.server"

/** Makes the customer that a store's way to pay is kept for; the same one when called again with this key. */
export async function makeCustomer(of: {
	key: string
	name: string
	email: string
	metadata: Record<string, string>
}): Promise<string> {
	const { key, ...params } = of
	return (await stripe().customers.create(params, { idempotencyKey: `customer-${key}` })).id
}

export type KeptCharge = {
	key: string
	amountCents: number
	title: string
	customerId: string
	methodId: string
	metadata: Record<string, string>
}

/**
 * Charges a kept way to pay while nobody is there to be asked. Answers the payment's id, whether or not the bank agreed:
 * what came of it is asked for by that id. Throws when the service does not answer; `key` makes a repeated call find the
 * first charge.
 */
export async function chargeKept(charge: KeptCharge): Promise<string> {
	const { key, amountCents, title, customerId, methodId, metadata } = charge
	try {
		const intent = await stripe().paymentIntents.create(
			{
				amount: amountCents,
				currency: "usd",
				description: title,
				customer: customerId,
				payment_method: methodId,
				off_session: true,
				confirm: true,
				metadata,
			},
			{ idempotencyKey: `kept-${key}` },
		)
		return intent.id
	} catch (error) {
		if (error instanceof Stripe.errors.StripeCardError && error.payment_intent) return error.payment_intent.id
		throw error
	}
}

/** Whether an error says that the request itself was refused, so that asking again is of no use. */
export function isRefusal(error: unknown): boolean {
	return error instanceof Stripe.errors.StripeInvalidRequestError
}

/** Forgets a kept way to pay. One that is forgotten already is as good. */
export async function forgetMethod(methodId: string): Promise<void> {
	await stripe()
		.paymentMethods.detach(methodId)
		.catch((error: unknown) => {
			if (!isRefusal(error)) throw error
		})
}

/**
 * Gives back part of a payment, or all. `returnId` makes a repeated call find the first refund, and comes back with it.
 * Throws when the service refuses (`isRefusal`) or does not answer.
 */
export async function refund(of: { returnId: string; intentId: string; amountCents: number }): Promise<void> {
	await stripe().refunds.create(
		{ payment_intent: of.intentId, amount: of.amountCents, metadata: { return_id: of.returnId } },
		{ idempotencyKey: `refund-${of.returnId}` },
	)
}
