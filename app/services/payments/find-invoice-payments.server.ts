import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { parseInvoiceNumber } from "~/domain/invoicing/invoice-number"
import type { PaymentMethod, PaymentState } from "~/domain/payments/payment-words"

/** A payment that has to do with an invoice: what of it settles the invoice now, and whether the bank has taken any back. */
export type InvoicePayment = {
	id: string
	method: PaymentMethod
	state: PaymentState
	receivedOn: Day
	amountCents: number
	settledCents: number
	returnedCents: number
	/** Of this invoice. */
	cents: number
	isDisputed: boolean
}

export type InvoicePayments = { storeSlug: string; payments: InvoicePayment[]; onItsWayCents: number }

/** The payments of an invoice, the earlier first, with those that are on their way or came back. Null when there is none. */
export function findInvoicePayments(query: {
	producerId: string
	storeId?: string
	number: string
}): Promise<InvoicePayments | null> {
	const { producerId, storeId, number } = query
	const named = parseInvoiceNumber(number)
	if (!named) return Promise.resolve(null)
	return readProducer(producerId, async (tx) => {
		const ofStore = storeId ? sql`and i.store_id = ${storeId}` : sql``
		const { rows: found } = await tx.execute<{ id: string; storeSlug: string }>(sql`
			select i.id, s.slug as "storeSlug" from invoices i
			join stores s on s.producer_id = i.producer_id and s.id = i.store_id
			where i.producer_id = ${producerId} and i.year = ${named.year} and i.sequence = ${named.sequence} ${ofStore}`)
		const invoice = found[0]
		if (!invoice) return null
		const { rows: payments } = await tx.execute<InvoicePayment>(sql`
			with settled as (
				select payment_id as id, sum(amount_cents) filter (where kind = 'payment')::int as cents from settlements
				where producer_id = ${producerId} and invoice_id = ${invoice.id} and payment_id is not null
				group by payment_id
			), meant as (
				select p.id, x.amount_cents as cents from online_payment_parts x
				join online_payments o on o.producer_id = x.producer_id and o.id = x.online_payment_id
				join payments p on p.producer_id = o.producer_id and p.stripe_payment_intent_id = o.stripe_payment_intent_id
				where x.producer_id = ${producerId} and x.invoice_id = ${invoice.id}
			)
			select p.id, p.method, p.state, p.received_on::text as "receivedOn", p.amount_cents as "amountCents",
				p.settled_cents as "settledCents", p.returned_cents as "returnedCents",
				case p.state when 'on-its-way' then m.cents else coalesce(s.cents, 0) end as cents,
				exists (select from payment_returns r where r.producer_id = p.producer_id and r.payment_id = p.id
					and r.kind = 'dispute' and r.state in ('asked', 'done')) as "isDisputed"
			from payments p
			left join settled s on s.id = p.id
			left join meant m on m.id = p.id
			where p.producer_id = ${producerId} and (s.id is not null or m.id is not null)
			order by p.received_on, p.received_at, p.id`)
		const onItsWay = payments.filter(({ state }) => state === "on-its-way")
		const onItsWayCents = onItsWay.reduce((sum, { cents }) => sum + cents, 0)
		return { storeSlug: invoice.storeSlug, payments, onItsWayCents }
	})
}
