import { sql } from "drizzle-orm"
import { stripeDifferences } from "~/db/schema"
import { readProducer, type Tx, withProducer } from "~/db/transaction.server"
import { type Difference, differenceOf, type OurPayment } from "~/domain/payments/stripe-difference"
import { now } from "~/platform/clock.server"
import type { ListedIntent } from "~/platform/stripe-ledger.server"
import { findPaymentFacts, isUnknown } from "~/platform/stripe-payment.server"
import { bringIntent } from "./bring-from-stripe.server"
import { pushRefund } from "./refund-payment.server"

type Query = { producerId: string; since: Date; intents: readonly ListedIntent[] }

/**
 * Holds a producer's payments beside Stripe's of the same days. What differs is brought to what Stripe says, and what
 * differs still is written down; a difference that is gone is settled. Throws when Stripe does not answer.
 */
export async function compareWithStripe(query: Query): Promise<void> {
	const { producerId } = query
	await askAgain(producerId)
	await giveUpAutomatic(query)
	for (const { stripeId } of await findDifferences(query)) await bringIntent(stripeId)
	const still = await findDifferences(query)
	await withProducer(producerId, (tx) => writeDifferences(tx, { ...query, still }))
}

/** Refunds that were asked for and never answered. */
async function askAgain(producerId: string): Promise<void> {
	const { rows } = await readProducer(producerId, (tx) =>
		tx.execute<{ returnId: string; intentId: string; amountCents: number }>(sql`
			select r.id as "returnId", p.stripe_payment_intent_id as "intentId", r.amount_cents as "amountCents"
			from payment_returns r
			join payments p on p.producer_id = r.producer_id and p.id = r.payment_id
			where r.producer_id = ${producerId} and r.kind = 'refund' and r.state = 'asked' and r.stripe_id is null
			order by r.created_at`),
	)
	for (const asked of rows) {
		const facts = await findPaymentFacts(asked.intentId)
		const isThere = facts.refunds.some(({ returnId }) => returnId === asked.returnId)
		if (isThere) await bringIntent(asked.intentId)
		else await pushRefund({ producerId, ...asked })
	}
}

/** An automatic payment whose request never reached Stripe is over: its key is not kept there any more. */
async function giveUpAutomatic({ producerId, intents }: Query): Promise<void> {
	const there = intents.flatMap(({ metadata }) => metadata.online_payment_id ?? [])
	await withProducer(producerId, (tx) =>
		tx.execute(sql`
			update online_payments set state = 'expired'
			where producer_id = ${producerId} and kind = 'automatic' and state = 'open'
				and created_at < now() - interval '1 day' and not id::text = any(${sql.param(there)}::text[])`),
	)
}

async function findDifferences({ producerId, since, intents }: Query): Promise<Difference[]> {
	const theirs = new Map(intents.map((intent) => [intent.intentId, intent]))
	const ours = await readProducer(producerId, (tx) => readOurs(tx, { producerId, since, intents }))
	const known = new Map(ours.map((payment) => [payment.intentId, payment]))
	const differences: Difference[] = []
	for (const intentId of new Set([...theirs.keys(), ...known.keys()])) {
		const there = theirs.get(intentId) ?? (await lookUp(intentId))
		const difference = differenceOf(intentId, known.get(intentId) ?? null, there)
		if (difference) differences.push(difference)
	}
	return differences
}

/** A payment that the list of the last days does not have was made before them, or there is none. */
async function lookUp(intentId: string) {
	const facts = await findPaymentFacts(intentId).catch((error: unknown) => {
		if (isUnknown(error)) return null
		throw error
	})
	if (!facts) return null
	const { state, amountCents, refunds } = facts
	const done = refunds.filter((one) => one.state !== "failed")
	const status = state === "paid" || state === "on-its-way" ? state : ("not-paid" as const)
	return { status, amountCents, returnedCents: done.reduce((sum, one) => sum + one.amountCents, 0) }
}

/** Our payments and sales by card that Stripe listed, those of the same days that it did not, and debits on their way. */
async function readOurs(tx: Tx, { producerId, since, intents }: Query): Promise<OurPayment[]> {
	const listed = sql.param(intents.map(({ intentId }) => intentId))
	const { rows } = await tx.execute<OurPayment>(sql`
		select p.stripe_payment_intent_id as "intentId",
			case p.state when 'settled' then 'paid' when 'returned' then 'not-paid' else 'on-its-way' end as status,
			p.amount_cents as "amountCents",
			coalesce((select sum(r.amount_cents) from payment_returns r where r.producer_id = p.producer_id
				and r.payment_id = p.id and r.kind = 'refund' and r.state in ('asked', 'done')), 0)::int as "returnedCents"
		from payments p
		where p.producer_id = ${producerId} and p.stripe_payment_intent_id is not null
			and (p.received_at >= ${since.toISOString()} or p.state = 'on-its-way' or p.stripe_payment_intent_id = any(${listed}::text[]))
		union all
		select s.stripe_payment_intent_id, case s.state when 'paid' then 'paid' else 'not-paid' end, s.total_cents, null
		from sales s
		where s.producer_id = ${producerId} and s.stripe_payment_intent_id = any(${listed}::text[])`)
	return rows
}

async function writeDifferences(
	tx: Tx,
	{ producerId, intents, still }: Query & { still: readonly Difference[] },
): Promise<void> {
	const open = still.map(({ kind, stripeId }) => `${kind} ${stripeId}`)
	const seen = intents.map(({ intentId }) => intentId)
	await tx.execute(sql`
		update stripe_differences set settled_at = ${now().toISOString()}
		where producer_id = ${producerId} and settled_at is null
			and not (kind || ' ' || stripe_id) = any(${sql.param(open)}::text[])
			and (stripe_id = any(${sql.param(seen)}::text[]) or kind = 'missing-there')`)
	if (still.length === 0) return
	await tx
		.insert(stripeDifferences)
		.values(still.map((difference) => ({ producerId, ...difference, foundAt: now() })))
		.onConflictDoUpdate({
			target: [stripeDifferences.producerId, stripeDifferences.kind, stripeDifferences.stripeId],
			set: {
				ourCents: sql`excluded.our_cents`,
				theirCents: sql`excluded.their_cents`,
				detail: sql`excluded.detail`,
				settledAt: null,
			},
		})
}
