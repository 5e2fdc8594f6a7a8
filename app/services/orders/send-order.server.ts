import { and, eq, sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { orders } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { canMove } from "~/domain/orders/order-states"
import { now } from "~/platform/clock.server"
import { issueInvoice } from "~/services/invoicing/issue-invoice.server"
import { type InvoiceRefusal, planInvoice } from "~/services/invoicing/plan-invoice.server"
import { lockOrder } from "./lock-order.server"
import { movePacked } from "./move-packed.server"
import { recordChange } from "./record-change.server"

export type Sending =
	| { ok: true; invoiceNumber: string | null }
	| { ok: false; reason: "no-such-order" }
	| { ok: false; reason: "not-packed"; state: string }
	| { ok: false; reason: "lot-withdrawn"; lotCode: string }
	| InvoiceRefusal

type OrderToSend = {
	producer: { id: string; slug: string; timeZone: string }
	number: number
	personId: string
}

/**
 * Sends a packed order off: its pieces are sold, and the invoice is issued from what was packed and mailed, all in one
 * transaction. A store that has one invoice a month gets none yet: `invoiceNumber` is null. Sending twice is refused, so
 * an order has one invoice; so are sending pieces of a lot that was withdrawn since they were packed, and an order that
 * could not be invoiced as it is.
 */
export async function sendOrder(query: OrderToSend): Promise<Sending> {
	try {
		return await withProducer(query.producer.id, (tx) => sendOrderIn(tx, query))
	} catch (error) {
		// Closed between the look at the books and the writing of the invoice.
		if (!breaksConstraint(error, "books_closed")) throw error
		return { ok: false, reason: "books-closed", until: dayInZone(now(), query.producer.timeZone) }
	}
}

/** The same inside a transaction; a refusal has written nothing. */
export async function sendOrderIn(tx: Tx, query: OrderToSend): Promise<Sending> {
	const { producer, number, personId } = query
	const order = await lockOrder(tx, { producerId: producer.id, number })
	if (!order) return { ok: false, reason: "no-such-order" }
	if (!canMove(order.state, "sent")) return { ok: false, reason: "not-packed", state: order.state }
	const lotCode = await findWithdrawnLot(tx, { producerId: producer.id, orderId: order.id })
	if (lotCode !== null) return { ok: false, reason: "lot-withdrawn", lotCode }
	const issuedOn = dayInZone(now(), producer.timeZone)
	const isMonthly = order.store.invoicing === "month-end"
	const planned = await planInvoice(tx, { producerId: producer.id, orders: [order], issuedOn })
	if (!planned.ok && !(isMonthly && planned.reason === "books-closed")) return planned
	const reason = `sent with order ${order.number}`
	await movePacked(tx, { producerId: producer.id, orderId: order.id, to: "sold", reason, personId })
	await tx
		.update(orders)
		.set({ state: "sent" })
		.where(and(eq(orders.producerId, producer.id), eq(orders.id, order.id)))
	await recordChange(tx, { producerId: producer.id, orderId: order.id, kind: "sent", userId: personId })
	if (isMonthly || !planned.ok) return { ok: true, invoiceNumber: null }
	return { ok: true, invoiceNumber: await issueInvoice(tx, { producer, plan: planned.plan, personId }) }
}

/** The code of a withdrawn lot that the order was packed from, or null. Its lots can be withdrawn only after this. */
async function findWithdrawnLot(tx: Tx, query: { producerId: string; orderId: string }): Promise<string | null> {
	const { rows } = await tx.execute<{ code: string; state: string }>(sql`
		select l.code, l.state from lots l
		where l.producer_id = ${query.producerId} and l.id in (
			select x.lot_id from order_lines e
			join order_line_lots x on x.producer_id = e.producer_id and x.order_line_id = e.id
			where e.producer_id = ${query.producerId} and e.order_id = ${query.orderId})
		order by l.id for share`)
	return rows.find(({ state }) => state === "withdrawn")?.code ?? null
}
