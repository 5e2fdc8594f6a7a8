import { and, eq } from "drizzle-orm"
import { onlinePayments, stores } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { openKeepPage } from "~/platform/card-page.server"
import { env } from "~/platform/env.server"
import { log } from "~/platform/log.server"
import { makeCustomer } from "~/platform/stripe-kept.server"
import { closeVisit, storeSession } from "./visits.server"

/**
 * Sends a person to the hosted page where a card or a bank account is kept for the store; nothing is charged. What was
 * kept is written down when Stripe says so. `no-answer` when the payment service cannot be reached.
 */
export async function keepMethod(query: {
	producer: { id: string; slug: string }
	store: { id: string; slug: string; name: string }
	person: { id: string; email: string }
	method: "card" | "bank-debit"
}): Promise<{ ok: true; url: string } | { ok: false; reason: "no-answer" }> {
	const { producer, store, person, method } = query
	const producerId = producer.id
	const visitId = await withProducer(producerId, async (tx) => {
		const [visit] = await tx
			.insert(onlinePayments)
			.values({ producerId, storeId: store.id, kind: "keep-method", method, amountCents: 0, startedBy: person.id })
			.returning({ id: onlinePayments.id })
		if (!visit) throw new Error("an insert returns its row")
		return visit.id
	})
	const page = `${env.BASE_URL}/buy/${producer.slug}/${store.slug}/payment-method`
	try {
		const customerId = await customerOf(query)
		const session = await openKeepPage({
			key: visitId,
			method,
			customerId,
			metadata: { producer_id: producerId, online_payment_id: visitId },
			doneUrl: `${page}?kept=${visitId}`,
			backUrl: page,
		})
		await storeSession({ producerId, visitId, sessionId: session.id })
		return { ok: true, url: session.url }
	} catch (error) {
		log.warn({ err: error, onlinePaymentId: visitId }, "the page to keep a way to pay could not be opened")
		await closeVisit({ producerId, visitId })
		return { ok: false, reason: "no-answer" }
	}
}

/** The store's customer at Stripe; made when there is none yet. */
async function customerOf({
	producer,
	store,
	person,
}: {
	producer: { id: string }
	store: { id: string; name: string }
	person: { email: string }
}): Promise<string> {
	const isStore = and(eq(stores.producerId, producer.id), eq(stores.id, store.id))
	const known = await withProducer(producer.id, async (tx) => {
		const [row] = await tx.select({ customerId: stores.stripeCustomerId }).from(stores).where(isStore)
		return row?.customerId
	})
	if (known) return known
	const customerId = await makeCustomer({
		key: store.id,
		name: store.name,
		email: person.email,
		metadata: { producer_id: producer.id, store_id: store.id },
	})
	await withProducer(producer.id, (tx) => tx.update(stores).set({ stripeCustomerId: customerId }).where(isStore))
	return customerId
}
