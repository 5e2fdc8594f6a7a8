import { sql } from "drizzle-orm"
import { z } from "zod"
import { payouts } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findIntentMetadata, findPayout, type PayoutEntry } from "~/platform/stripe-ledger.server"
import { isUnknown } from "~/platform/stripe-payment.server"

/**
 * Writes down what a payout brought to each producer: the sum of its payments and sales by card, less refunds, disputes
 * and fees, and on each payment which payout brought it. One installation has one account at Stripe, so that a payout may
 * be of several producers. Again, it changes nothing. Throws when Stripe does not answer.
 */
export async function fillPayout(stripePayoutId: string): Promise<void> {
	const payout = await findPayout(stripePayoutId).catch((error: unknown) => {
		if (isUnknown(error)) return null
		throw error
	})
	if (!payout) return
	for (const [producerId, entries] of await byProducer(payout.entries)) {
		await writePayout({ producerId, stripePayoutId, arrivedOn: payout.arrivedOn, entries })
	}
}

async function byProducer(entries: readonly PayoutEntry[]): Promise<Map<string, PayoutEntry[]>> {
	const owners = new Map<string, string | undefined>()
	const parts = new Map<string, PayoutEntry[]>()
	for (const entry of entries) {
		if (!owners.has(entry.intentId)) {
			const { producer_id } = await findIntentMetadata(entry.intentId)
			owners.set(entry.intentId, z.uuid().safeParse(producer_id).data)
		}
		const producerId = owners.get(entry.intentId)
		if (producerId) parts.set(producerId, [...(parts.get(producerId) ?? []), entry])
	}
	return parts
}

async function writePayout(of: {
	producerId: string
	stripePayoutId: string
	arrivedOn: string
	entries: readonly PayoutEntry[]
}): Promise<void> {
	const { producerId, stripePayoutId, arrivedOn, entries } = of
	const grossCents = entries.reduce((sum, entry) => sum + entry.grossCents, 0)
	const feeCents = entries.reduce((sum, entry) => sum + entry.feeCents, 0)
	const charges = entries.filter(({ isCharge }) => isCharge)
	const intentIds = sql.param(charges.map(({ intentId }) => intentId))
	const fees = sql.param(charges.map((entry) => entry.feeCents))
	await withProducer(producerId, async (tx) => {
		for (const table of [sql`payments`, sql`sales`]) {
			await tx.execute(sql`
				update ${table} t set fee_cents = c.fee_cents, stripe_payout_id = ${stripePayoutId}
				from unnest(${intentIds}::text[], ${fees}::int[]) as c (intent_id, fee_cents)
				where t.producer_id = ${producerId} and t.stripe_payment_intent_id = c.intent_id
					and t.stripe_payout_id is distinct from ${stripePayoutId}`)
		}
		await tx
			.insert(payouts)
			.values({ producerId, stripePayoutId, arrivedOn, grossCents, feeCents, netCents: grossCents - feeCents })
			.onConflictDoNothing()
	})
}
