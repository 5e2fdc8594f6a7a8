import { and, eq, sql } from "drizzle-orm"
import { auditEntries, paymentReturns, type payments } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import type { PaymentFacts } from "~/platform/stripe-payment.server"
import { layAgain } from "./lay-meant.server"
import { openDay } from "./open-day.server"
import { queueDebitReturned, queueRefunded } from "./queue-failure.server"
import { takeBackSettlements } from "./write-settlements.server"

type Payment = typeof payments.$inferSelect
type Row = typeof paymentReturns.$inferSelect

/** What went back of a payment, as Stripe has it. */
type Return = {
	stripeId: string
	ownId: string | null
	kind: "refund" | "bank-return" | "dispute"
	state: Row["state"]
	amountCents: number
	on: Day
	note: string
	isLost: boolean
}

/** A refund may fail after it was done, a dispute may be won: never the other way round. */
const RANK: Record<Row["state"], number> = { asked: 0, done: 1, failed: 2, won: 2 }

/**
 * Brings what went back of a settled payment to what Stripe says: refunds, disputes, and debits that the bank returned
 * after they had cleared. What goes back comes from what is on account first, then from what the payment settled last;
 * what comes back again settles the same invoices. In a transaction that holds the store's account.
 */
export async function bringReturns(
	tx: Tx,
	{ payment, facts, zone }: { payment: Payment; facts: PaymentFacts; zone: string },
): Promise<void> {
	for (const news of returnsOf(facts, zone)) await bringReturn(tx, { payment, news, zone })
}

function returnsOf(facts: PaymentFacts, zone: string): Return[] {
	const kind = facts.method === "bank-debit" ? "bank-return" : "dispute"
	return [
		...facts.disputes.map(({ stripeId, amountCents, state, reason, isLost, at }) => ({
			...{ stripeId, ownId: null, kind, state, amountCents, note: reason, isLost },
			on: dayInZone(at, zone),
		})),
		...facts.refunds.map(({ stripeId, returnId, amountCents, state, at }) => ({
			...{ stripeId, ownId: returnId, kind: "refund" as const, state, amountCents, note: "", isLost: false },
			on: dayInZone(at, zone),
		})),
	] as Return[]
}

async function bringReturn(
	tx: Tx,
	{ payment, news, zone }: { payment: Payment; news: Return; zone: string },
): Promise<void> {
	const { producerId, storeId } = payment
	const known = await readReturn(tx, payment, news)
	const on = await openDay(tx, { producerId, day: news.on })
	if (news.isLost) await noteLost(tx, payment, news)
	if (known && RANK[news.state] <= RANK[known.state]) return
	const wasDone = known?.state === "done"
	const opened = news.state === "done" && !wasDone ? await makeRoom(tx, payment, news, on) : []
	if (known) {
		await tx
			.update(paymentReturns)
			.set({ state: news.state })
			.where(and(eq(paymentReturns.producerId, producerId), eq(paymentReturns.id, known.id)))
	} else {
		const { ownId, kind, state, amountCents, note, stripeId } = news
		const row = { producerId, paymentId: payment.id, kind, state, amountCents, note, stripeId, returnedOn: on }
		await tx.insert(paymentReturns).values(ownId ? { ...row, id: ownId } : row)
	}
	if (news.state === "done" && news.kind === "refund") await queueRefunded(tx, { payment, news })
	if (news.state === "done" && news.kind === "bank-return") await queueDebitReturned(tx, { payment, news })
	const again = wasDone ? await onceSettled(tx, payment) : opened
	await layAgain(tx, { producerId, storeId, invoiceIds: again, settledOn: on, zone })
}

async function readReturn(tx: Tx, { producerId, id }: Payment, { stripeId, ownId }: Return): Promise<Row | undefined> {
	const [row] = await tx
		.select()
		.from(paymentReturns)
		.where(
			and(
				eq(paymentReturns.producerId, producerId),
				eq(paymentReturns.paymentId, id),
				ownId ? eq(paymentReturns.id, ownId) : eq(paymentReturns.stripeId, stripeId),
			),
		)
	return row
}

/** Takes back from the invoices what the rest of the payment does not cover; answers those that are open again. */
async function makeRoom(tx: Tx, { producerId, id }: Payment, { amountCents }: Return, on: Day): Promise<string[]> {
	const { rows } = await tx.execute<{ leftCents: number }>(sql`
		select amount_cents - settled_cents - returned_cents as "leftCents" from payments
		where producer_id = ${producerId} and id = ${id}`)
	const cents = Math.max(0, amountCents - (rows[0]?.leftCents ?? 0))
	return takeBackSettlements(tx, { producerId, paymentId: id, settledOn: on, personId: null, cents })
}

/** The invoices from which something of the payment was taken back. */
async function onceSettled(tx: Tx, { producerId, id }: Payment): Promise<string[]> {
	const { rows } = await tx.execute<{ invoiceId: string }>(sql`
		select distinct invoice_id as "invoiceId" from settlements
		where producer_id = ${producerId} and payment_id = ${id} and kind = 'payment' and amount_cents < 0`)
	return rows.map(({ invoiceId }) => invoiceId)
}

/** A dispute that was decided against the producer takes no more than it had; that it is over is noted once. */
async function noteLost(tx: Tx, { producerId, id }: Payment, { stripeId, kind }: Return): Promise<void> {
	if (kind !== "dispute") return
	const { rows } = await tx.execute(sql`
		select 1 from audit_entries where producer_id = ${producerId} and subject_type = 'payment' and subject_id = ${id}
			and action = 'lose dispute' and detail ->> 'stripeId' = ${stripeId}`)
	if (rows.length > 0) return
	await tx.insert(auditEntries).values({
		producerId,
		action: "lose dispute",
		subjectType: "payment",
		subjectId: id,
		detail: { stripeId },
	})
}
