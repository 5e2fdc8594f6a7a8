import { and, eq, sql } from "drizzle-orm"
import { onlinePayments, type payments } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { now } from "~/platform/clock.server"
import type { PaymentFacts } from "~/platform/stripe-payment.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findPayer, type Try } from "./find-payer.server"

type Payment = Pick<
	typeof payments.$inferSelect,
	"producerId" | "id" | "amountCents" | "method" | "stripePaymentIntentId"
>
type Back = { stripeId: string; amountCents: number; on: Day; note: string }

/** Tells whoever paid that a debit came back before it cleared, or that what should go by itself was refused: once. */
export async function queueFailure(
	tx: Tx,
	{
		visit,
		facts,
	}: {
		visit: Try
		facts: Pick<PaymentFacts, "intentId" | "method" | "madeAt" | "amountCents" | "declineMessage">
	},
): Promise<void> {
	await queueLetter(tx, visit, {
		onceKey: `payment-failed:${facts.intentId}`,
		why: facts.method === "bank-debit" && facts.madeAt ? "debit-returned" : "automatic-refused",
		amountCents: facts.amountCents,
		reason: facts.declineMessage,
		on: null,
	})
}

/** Tells whoever paid that the bank has taken a debit back after it had cleared: once. */
export async function queueDebitReturned(tx: Tx, { payment, news }: { payment: Payment; news: Back }): Promise<void> {
	const visit = await tryOf(tx, payment)
	if (!visit) return
	await queueLetter(tx, visit, {
		onceKey: `payment-failed:${news.stripeId}`,
		why: "debit-returned",
		amountCents: news.amountCents,
		reason: news.note,
		on: news.on,
	})
}

/** Tells whoever paid that money is on its way back to them: once for each refund. */
export async function queueRefunded(tx: Tx, { payment, news }: { payment: Payment; news: Back }): Promise<void> {
	const visit = await tryOf(tx, payment)
	const payer = visit ? await findPayer(tx, visit) : null
	if (!payer) return
	await queueMail(tx, {
		producerId: payment.producerId,
		to: payer.email,
		onceKey: `payment-refunded:${news.stripeId}`,
		template: "payment-refunded",
		props: {
			...payer.head,
			amountCents: news.amountCents,
			paidCents: payment.amountCents,
			refundedOn: news.on,
			way: payment.method === "bank-debit" ? "bank" : "card",
		},
	})
}

async function tryOf(tx: Tx, payment: Payment): Promise<Try | undefined> {
	const [visit] = await tx
		.select()
		.from(onlinePayments)
		.where(
			and(
				eq(onlinePayments.producerId, payment.producerId),
				eq(onlinePayments.stripePaymentIntentId, payment.stripePaymentIntentId ?? ""),
			),
		)
	return visit
}

async function queueLetter(
	tx: Tx,
	visit: Try,
	letter: {
		onceKey: string
		why: "debit-returned" | "automatic-refused"
		amountCents: number
		reason: string
		on: Day | null
	},
): Promise<void> {
	const { producerId } = visit
	const payer = await findPayer(tx, visit)
	if (!payer) return
	const { rows } = await tx.execute<{ year: number; sequence: number; openCents: number; timeZone: string }>(sql`
		select i.year, i.sequence, i.open_cents as "openCents", p.time_zone as "timeZone"
		from online_payment_parts o
		join invoices i on i.producer_id = o.producer_id and i.id = o.invoice_id
		join producers p on p.id = o.producer_id
		where o.producer_id = ${producerId} and o.online_payment_id = ${visit.id}
		order by i.due_on, i.year, i.sequence`)
	const { onceKey, why, amountCents, reason, on } = letter
	await queueMail(tx, {
		producerId,
		to: payer.email,
		onceKey,
		template: "payment-failed",
		props: {
			...payer.head,
			why,
			amountCents,
			reason,
			on: on ?? dayInZone(now(), rows[0]?.timeZone ?? "UTC"),
			invoices: rows.map((row) => ({ invoiceNumber: invoiceNumber(row.year, row.sequence), openCents: row.openCents })),
		},
	})
}
