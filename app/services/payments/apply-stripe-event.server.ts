import { eq, sql } from "drizzle-orm"
import { z } from "zod"
import { stripeEvents } from "~/db/schema"
import { withPlatform, withProducer } from "~/db/transaction.server"
import { findCardOutcome } from "~/platform/card-outcome.server"
import { settleSale } from "~/services/stall/settle-sale.server"
import { settleCardPayment } from "./settle-card-payment.server"

/** What we wrote into every object at Stripe, and so find in every event about it. */
const ours = z.object({ producer_id: z.uuid(), card_payment_id: z.uuid().optional(), sale_id: z.uuid().optional() })

const subject = z.object({
	data: z.object({
		object: z.object({
			id: z.string(),
			object: z.string(),
			payment_intent: z
				.union([z.string(), z.object({ id: z.string() }).transform((intent) => intent.id), z.null()])
				.optional(),
			metadata: z.record(z.string(), z.string()).nullish(),
		}),
	}),
})

/**
 * Applies a stored event once. The event is a hint only: what counts is the state of the payment at Stripe now, so that
 * events may come twice and in any order. The effect and the mark "applied" are one transaction. Events about objects
 * that are not ours, or of no consequence, are marked and left. Throws when Stripe does not answer: tried again later.
 */
export async function applyStripeEvent({ eventId }: { eventId: string }): Promise<void> {
	const event = await withPlatform(async (tx) => {
		const [row] = await tx.select().from(stripeEvents).where(eq(stripeEvents.id, eventId))
		return row
	})
	if (!event || event.appliedAt) return
	const mark = { appliedAt: sql`now()` }
	const about = subject.safeParse(event.payload).data?.data.object
	const owner = ours.safeParse(about?.metadata).data
	const isPayment = about?.object === "checkout.session" || about?.object === "payment_intent"
	if (!about || !owner || !isPayment) {
		await withPlatform((tx) => tx.update(stripeEvents).set(mark).where(eq(stripeEvents.id, eventId)))
		return
	}
	const outcome = await findCardOutcome(
		about.object === "payment_intent" ? { intentId: about.id } : { sessionId: about.id },
	)
	await withProducer(owner.producer_id, async (tx) => {
		const settled = { producerId: owner.producer_id, outcome }
		if (owner.card_payment_id) await settleCardPayment(tx, { ...settled, cardPaymentId: owner.card_payment_id })
		if (owner.sale_id) await settleSale(tx, { ...settled, saleId: owner.sale_id })
		await tx.update(stripeEvents).set(mark).where(eq(stripeEvents.id, eventId))
	})
}
