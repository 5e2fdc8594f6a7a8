import { sql } from "drizzle-orm"
import { z } from "zod"
import { stripeEvents } from "~/db/schema"
import { type PlatformTx, withPlatform } from "~/db/transaction.server"
import { now } from "~/platform/clock.server"
import { type ListedIntent, listEvents, listIntents, listPayouts } from "~/platform/stripe-ledger.server"
import { compareWithStripe } from "./compare-with-stripe.server"
import { fillPayout } from "./fill-payout.server"

const DAY_MS = 86_400_000
/** Stripe keeps events for thirty days; a week bridges any break that goes unnoticed over a holiday. */
const DAYS = 7
/** A payout comes days after its payments. */
const PAYOUT_DAYS = 21

/**
 * The nightly look at Stripe: takes in the events of the last week that never came, brings every payment that stands
 * otherwise here than there to what Stripe says, asks again for refunds that were not answered, fills in fees and payouts,
 * and writes down what still differs afterwards. Again, it changes nothing more. Throws when Stripe does not answer, so
 * that the job comes again.
 */
export async function reconcileStripe(): Promise<void> {
	const since = new Date(now().getTime() - DAYS * DAY_MS)
	await takeInMissed(since)
	const intents = byProducer(await listIntents(since))
	const producers = await withPlatform(listProducers)
	for (const producerId of producers) {
		await compareWithStripe({ producerId, since, intents: intents.get(producerId) ?? [] })
	}
	for (const payoutId of await listPayouts(new Date(now().getTime() - PAYOUT_DAYS * DAY_MS))) await fillPayout(payoutId)
}

async function listProducers(tx: PlatformTx): Promise<string[]> {
	const { rows } = await tx.execute<{ id: string }>(sql`select id from producers order by id`)
	return rows.map(({ id }) => id)
}

/** Stores events that were never delivered and queues them, and those that were stored and never applied. */
async function takeInMissed(since: Date): Promise<void> {
	const events = await listEvents(since)
	await withPlatform(async (tx) => {
		for (let from = 0; from < events.length; from += 500) {
			await tx
				.insert(stripeEvents)
				.values(events.slice(from, from + 500))
				.onConflictDoNothing()
		}
		await tx.execute(sql`
			select jobs.enqueue('apply-stripe-event', json_build_object('eventId', id), null, 'stripe-event:' || id)
			from stripe_events where applied_at is null order by received_at`)
	})
}

function byProducer(intents: readonly ListedIntent[]): Map<string, ListedIntent[]> {
	const found = new Map<string, ListedIntent[]>()
	for (const intent of intents) {
		const producerId = z.uuid().safeParse(intent.metadata.producer_id).data
		if (producerId) found.set(producerId, [...(found.get(producerId) ?? []), intent])
	}
	return found
}
