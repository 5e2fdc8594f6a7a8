import { sql } from "drizzle-orm"
import Stripe from "stripe"
import { stripeEvents } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { verifyStripeEvent } from "~/platform/stripe.server"

/**
 * Takes in one delivery of an event: checks the signature over the raw body, stores the event under its own id and
 * queues its application in the same transaction. A repeated delivery is counted and changes nothing else.
 * Answers false when the signature does not hold or is too old.
 */
export async function receiveStripeEvent(rawBody: string, signature: string | null): Promise<boolean> {
	const event = verifiedEvent(rawBody, signature)
	if (!event) return false
	await withPlatform(async (tx) => {
		const [stored] = await tx
			.insert(stripeEvents)
			.values({ id: event.id, type: event.type, isLive: event.livemode, payload: { ...event } })
			.onConflictDoUpdate({ target: stripeEvents.id, set: { deliveries: sql`${stripeEvents.deliveries} + 1` } })
			.returning({ deliveries: stripeEvents.deliveries })
		if (stored?.deliveries !== 1) return
		await tx.execute(sql`select jobs.enqueue('apply-stripe-event', ${JSON.stringify({ eventId: event.id })}::json)`)
	})
	return true
}

function verifiedEvent(rawBody: string, signature: string | null): Stripe.Event | null {
	try {
		return verifyStripeEvent(rawBody, signature)
	} catch (error) {
		if (error instanceof Stripe.errors.StripeSignatureVerificationError) return null
		throw error
	}
}
