import { and, eq, sql } from "drizzle-orm"
import { orders, stockBalances, stockMoves } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { canMove } from "~/domain/orders/order-states"
import { issueInvoice } from "~/services/invoicing/issue-invoice.server"
import { lockOrder } from "./lock-order.server"
import { recordChange } from "./record-change.server"

export type Sending =
	| { ok: true; invoiceNumber: string }
	| { ok: false; reason: "no-such-order" }
	| { ok: false; reason: "not-packed"; state: string }
	| { ok: false; reason: "lot-withdrawn"; lotCode: string }

/**
 * Sends a packed order off: its pieces are sold, and the invoice is issued from what was packed and mailed, all in one
 * transaction. Sending twice is refused, so an order has one invoice, and so is sending pieces of a lot that was withdrawn
 * since they were packed.
 */
export async function sendOrder(query: {
	producer: { id: string; slug: string; timeZone: string }
	number: number
	personId: string
}): Promise<Sending> {
	const { producer, number, personId } = query
	return withProducer(producer.id, async (tx) => {
		const order = await lockOrder(tx, { producerId: producer.id, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (!canMove(order.state, "sent")) return { ok: false, reason: "not-packed", state: order.state }
		const lotCode = await findWithdrawnLot(tx, { producerId: producer.id, orderId: order.id })
		if (lotCode !== null) return { ok: false, reason: "lot-withdrawn", lotCode }
		const packed = await tx
			.select({ lotId: stockBalances.lotId, pieces: stockBalances.pieces })
			.from(stockBalances)
			.where(
				and(
					eq(stockBalances.producerId, producer.id),
					eq(stockBalances.place, "packed"),
					eq(stockBalances.placeRef, order.id),
				),
			)
			.orderBy(stockBalances.lotId)
		const moves = packed
			.filter(({ pieces }) => pieces > 0)
			.map(({ lotId, pieces }) => ({
				producerId: producer.id,
				lotId,
				fromPlace: "packed" as const,
				fromRef: order.id,
				toPlace: "sold" as const,
				toRef: order.id,
				pieces,
				reason: `sent with order ${number}`,
				movedBy: personId,
			}))
		if (moves.length > 0) await tx.insert(stockMoves).values(moves)
		await tx
			.update(orders)
			.set({ state: "sent" })
			.where(and(eq(orders.producerId, producer.id), eq(orders.id, order.id)))
		await recordChange(tx, { producerId: producer.id, orderId: order.id, kind: "sent", userId: personId })
		const invoiceNumber = await issueInvoice(tx, { producer, order, personId })
		return { ok: true, invoiceNumber }
	})
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
