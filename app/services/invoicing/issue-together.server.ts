import { sql } from "drizzle-orm"
import { type Tx, withProducer } from "~/db/transaction.server"
import { addDays, type Day, dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { log } from "~/platform/log.server"
import { findInvoicingProducer } from "./find-invoicing-producer.server"
import { issueInvoice } from "./issue-invoice.server"
import { lockUninvoiced } from "./lock-uninvoiced.server"
import { findClosedUntil, type InvoiceRefusal, planInvoice } from "./plan-invoice.server"

type Producer = { id: string; slug: string; timeZone: string }

export type Together =
	| { ok: true; invoiceNumber: string; orderCount: number }
	| { ok: false; reason: "nothing-waits" }
	| InvoiceRefusal

type Issuing = {
	producer: Producer
	storeId: string
	until: Day
	issuedOn: Day
	onceKey: string
	personId: string | null
}

/** After every day: whatever was sent goes on it, also ahead of its day. */
const EVER = "9999-12-31"

/**
 * Issues one invoice for every sent order of a store that is on none yet, dated today, because somebody at the desk asks
 * for it. `formId` is made with the form: sent again it finds what it made. Recorded on each order.
 */
export function issueWaitingNow(query: {
	producer: Producer
	storeId: string
	personId: string
	formId: string
}): Promise<Together> {
	const { producer, storeId, personId, formId } = query
	const today = dayInZone(now(), producer.timeZone)
	return withProducer(producer.id, (tx) =>
		issueTogether(tx, {
			producer,
			storeId,
			until: EVER,
			issuedOn: today,
			onceKey: `by-hand:${formId}`,
			personId,
		}),
	)
}

/**
 * Issues the invoices of the month before today's for every store that has sent orders of it on none: one a store, dated
 * the last day of the month, or today where the books of that day are closed. A store's invoice of a month is made once,
 * however often and late this runs; each is a transaction of its own. A refusal is logged and tried again the next
 * night.
 */
export async function issueMonthEnds({ producerId }: { producerId: string }): Promise<void> {
	const producer = await findInvoicingProducer(producerId)
	const today = dayInZone(now(), producer.timeZone)
	const until = addDays(`${today.slice(0, 7)}-01`, -1)
	const { storeIds, closedUntil } = await withProducer(producer.id, async (tx) => ({
		storeIds: await findStoresWaiting(tx, { producerId: producer.id, until }),
		closedUntil: await findClosedUntil(tx, producer.id),
	}))
	const issuedOn = closedUntil !== null && closedUntil >= until ? today : until
	for (const storeId of storeIds) {
		const onceKey = `month-end:${storeId}:${until.slice(0, 7)}`
		const answer = await withProducer(producer.id, (tx) =>
			issueTogether(tx, { producer, storeId, until, issuedOn, onceKey, personId: null }),
		)
		if (!answer.ok && answer.reason !== "nothing-waits")
			log.warn({ storeId, month: until.slice(0, 7), ...answer }, "the invoice of a month was not issued")
	}
}

async function issueTogether(tx: Tx, query: Issuing): Promise<Together> {
	const { producer, storeId, until, issuedOn, onceKey, personId } = query
	const orders = await lockUninvoiced(tx, { producerId: producer.id, storeId, until })
	if (orders.length === 0 || (await isMade(tx, { producerId: producer.id, onceKey })))
		return { ok: false, reason: "nothing-waits" }
	const planned = await planInvoice(tx, { producerId: producer.id, orders, issuedOn })
	if (!planned.ok) return planned
	const invoiceNumber = await issueInvoice(tx, { producer, plan: planned.plan, personId, onceKey })
	return { ok: true, invoiceNumber, orderCount: orders.length }
}

async function isMade(tx: Tx, query: { producerId: string; onceKey: string }): Promise<boolean> {
	const { rows } = await tx.execute(sql`
		select from invoices where producer_id = ${query.producerId} and once_key = ${query.onceKey}`)
	return rows.length > 0
}

/** Deliveries further back than this were settled otherwise: nobody waits a year for an invoice. */
const LOOK_BACK_DAYS = 400

async function findStoresWaiting(tx: Tx, query: { producerId: string; until: Day }): Promise<string[]> {
	const { producerId, until } = query
	const { rows } = await tx.execute<{ storeId: string }>(sql`
		select distinct o.store_id as "storeId" from orders o
		where o.producer_id = ${producerId} and o.state in ('sent', 'received')
			and o.delivery_on between ${addDays(until, -LOOK_BACK_DAYS)} and ${until}
			and not exists (select from invoice_orders x where x.producer_id = o.producer_id and x.order_id = o.id)
		order by o.store_id`)
	return rows.map(({ storeId }) => storeId)
}
