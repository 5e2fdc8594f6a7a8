import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type Day, isDay } from "~/domain/calendar"
import type { PaymentMethod, PaymentState } from "~/domain/payments/payment-words"

export type ListedPayment = {
	id: string
	storeName: string
	method: PaymentMethod
	state: PaymentState
	receivedOn: Day
	reference: string
	amountCents: number
	settledCents: number
	returnedCents: number
	isDisputed: boolean
}

const PAGE = 30

const KEY = /^(\d{4}-\d{2}-\d{2})_([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})$/

/**
 * The producer's payments, the latest first, 30 at a time. `after` is the `next` of an earlier page; one that is malformed
 * gives the first page. `next` is null on the last page.
 */
export function listPayments(query: {
	producerId: string
	after: string | null
}): Promise<{ payments: ListedPayment[]; next: string | null }> {
	const { producerId } = query
	const [, on = "", id = ""] = KEY.exec(query.after ?? "") ?? []
	const beyond = isDay(on) ? sql`and (p.received_on, p.id) < (${on}::date, ${id}::uuid)` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<ListedPayment>(sql`
			select p.id, s.name as "storeName", p.method, p.state, p.received_on::text as "receivedOn", p.reference,
				p.amount_cents as "amountCents", p.settled_cents as "settledCents", p.returned_cents as "returnedCents",
				exists (select from payment_returns r where r.producer_id = p.producer_id and r.payment_id = p.id
					and r.kind = 'dispute' and r.state in ('asked', 'done')) as "isDisputed"
			from payments p
			join stores s on s.producer_id = p.producer_id and s.id = p.store_id
			where p.producer_id = ${producerId} ${beyond}
			order by p.received_on desc, p.id desc
			limit ${PAGE + 1}`)
		const payments = rows.slice(0, PAGE)
		const last = payments.at(-1)
		return { payments, next: rows.length > PAGE && last ? `${last.receivedOn}_${last.id}` : null }
	})
}
