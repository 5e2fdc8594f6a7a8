import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { refundableCents } from "~/domain/payments/lay-payment"
import type { PaymentMethod, PaymentState, ReturnKind, ReturnState } from "~/domain/payments/payment-words"

/** What a payment settled, or had taken back: one row of the ledger. */
export type SettledRow = { number: string; kind: "payment" | "discount"; cents: number; on: Day }

export type ReturnRow = {
	id: string
	kind: ReturnKind
	state: ReturnState
	amountCents: number
	on: Day
	note: string
	by: string | null
	isLost: boolean
}

/** One payment with all that is known of it. */
export type PaymentPage = {
	id: string
	storeName: string
	storeSlug: string
	method: PaymentMethod
	state: PaymentState
	amountCents: number
	settledCents: number
	returnedCents: number
	receivedOn: Day
	reference: string
	feeCents: number | null
	stripePayoutId: string | null
	payoutOn: Day | null
	stripePaymentIntentId: string | null
	enteredBy: string | null
	/** It was taken by itself on the day that something fell due. */
	isAutomatic: boolean
	settled: SettledRow[]
	returns: ReturnRow[]
	refundableCents: number
}

const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

/** One payment for its page; null when there is none. */
export async function findPayment(query: { producerId: string; paymentId: string }): Promise<PaymentPage | null> {
	if (!uuid.test(query.paymentId)) return null
	return readProducer(query.producerId, async (tx) => {
		const payment = await readHead(tx, query)
		if (!payment) return null
		const returns = await readReturns(tx, query)
		return {
			...payment,
			settled: await readSettled(tx, query),
			returns,
			refundableCents: refundableCents({ amountCents: payment.amountCents, returns }),
		}
	})
}

type Query = { producerId: string; paymentId: string }

async function readHead(tx: Tx, { producerId, paymentId }: Query) {
	const { rows } = await tx.execute<Omit<PaymentPage, "settled" | "returns" | "refundableCents">>(sql`
		select p.id, s.name as "storeName", s.slug as "storeSlug", p.method, p.state, p.amount_cents as "amountCents",
			p.settled_cents as "settledCents", p.returned_cents as "returnedCents", p.received_on::text as "receivedOn",
			p.reference, p.fee_cents as "feeCents", p.stripe_payout_id as "stripePayoutId", o.arrived_on::text as "payoutOn",
			p.stripe_payment_intent_id as "stripePaymentIntentId", u.name as "enteredBy",
			exists (select from online_payments t where t.producer_id = p.producer_id and t.store_id = p.store_id
				and t.kind = 'automatic' and t.stripe_payment_intent_id = p.stripe_payment_intent_id) as "isAutomatic"
		from payments p
		join stores s on s.producer_id = p.producer_id and s.id = p.store_id
		left join payouts o on o.producer_id = p.producer_id and o.stripe_payout_id = p.stripe_payout_id
		left join users u on u.id = p.entered_by
		where p.producer_id = ${producerId} and p.id = ${paymentId}`)
	return rows[0]
}

async function readSettled(tx: Tx, { producerId, paymentId }: Query): Promise<SettledRow[]> {
	const { rows } = await tx.execute<Omit<SettledRow, "number"> & { year: number; sequence: number }>(sql`
		select i.year, i.sequence, t.kind, t.amount_cents as cents, t.settled_on::text as on
		from settlements t join invoices i on i.producer_id = t.producer_id and i.id = t.invoice_id
		where t.producer_id = ${producerId} and t.payment_id = ${paymentId}
		order by t.settled_at, i.due_on, i.year, i.sequence, t.kind desc`)
	return rows.map(({ year, sequence, ...row }) => ({ ...row, number: invoiceNumber(year, sequence) }))
}

async function readReturns(tx: Tx, { producerId, paymentId }: Query): Promise<ReturnRow[]> {
	const { rows } = await tx.execute<ReturnRow>(sql`
		select r.id, r.kind, r.state, r.amount_cents as "amountCents", r.returned_on::text as on, r.note, u.name as by,
			exists (select from audit_entries a where a.producer_id = r.producer_id and a.subject_type = 'payment'
				and a.subject_id = r.payment_id and a.action = 'lose dispute' and a.detail ->> 'stripeId' = r.stripe_id) as "isLost"
		from payment_returns r left join users u on u.id = r.entered_by
		where r.producer_id = ${producerId} and r.payment_id = ${paymentId}
		order by r.created_at, r.id`)
	return rows
}
