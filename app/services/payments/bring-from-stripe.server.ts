import { z } from "zod"
import { withProducer } from "~/db/transaction.server"
import { findPaymentFacts, findSessionFacts, isUnknown, type PaymentFacts } from "~/platform/stripe-payment.server"
import { settleSale } from "~/services/stall/settle-sale.server"
import { bringPayment } from "./bring-payment.server"
import { bringVisit } from "./bring-visit.server"

/** What we wrote into every object at Stripe. */
const ours = z.object({ producer_id: z.uuid(), online_payment_id: z.uuid().optional(), sale_id: z.uuid().optional() })

/**
 * Brings a payment to what Stripe says of it now. One that is not ours, or that Stripe does not know, is left. Throws when
 * Stripe does not answer.
 */
export async function bringIntent(intentId: string): Promise<void> {
	const facts = await findPaymentFacts(intentId).catch(unlessUnknown)
	const owner = ours.safeParse(facts?.metadata).data
	if (!facts || !owner) return
	await withProducer(owner.producer_id, async (tx) => {
		const producerId = owner.producer_id
		if (owner.online_payment_id) await bringPayment(tx, { producerId, onlinePaymentId: owner.online_payment_id, facts })
		if (owner.sale_id) await settleSale(tx, { producerId, saleId: owner.sale_id, outcome: saleOutcome(facts) })
	})
}

/** As `bringIntent`, for a visit to the hosted page: one with a payment, one that only keeps a way to pay, or none yet. */
export async function bringSession(sessionId: string): Promise<void> {
	const facts = await findSessionFacts(sessionId).catch(unlessUnknown)
	const owner = ours.safeParse(facts?.metadata).data
	if (!facts || !owner) return
	if (facts.intentId) return bringIntent(facts.intentId)
	const onlinePaymentId = owner.online_payment_id
	if (!onlinePaymentId) return
	await withProducer(owner.producer_id, (tx) =>
		bringVisit(tx, { producerId: owner.producer_id, onlinePaymentId, sessionId, ...facts }),
	)
}

function saleOutcome(facts: PaymentFacts) {
	const { intentId, declineMessage } = facts
	const state = facts.state === "on-its-way" ? ("open" as const) : facts.state
	return { intentId, state, declineMessage, paidCents: facts.state === "paid" ? facts.amountCents : 0 }
}

function unlessUnknown(error: unknown): null {
	if (isUnknown(error)) return null
	throw error
}
