import { and, eq, inArray, isNull } from "drizzle-orm"
import { orderLineLots, orders, outboxMails } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { canMove, type OrderState } from "~/domain/orders/order-states"
import type { Result } from "~/domain/result"
import { confirmationKey } from "./confirm-order.server"
import { type LockedOrder, lockOrder } from "./lock-order.server"
import { movePacked } from "./move-packed.server"
import { recordChange } from "./record-change.server"

/**
 * Cancels an order at the desk, until it is sent: what it was promised is free again, what was packed goes back to the
 * ready shelf, and a confirmation that has not gone yet is not sent. Cancelling a cancelled order is no refusal. No
 * letter tells the store.
 */
export function cancelFromDesk(query: {
	producerId: string
	number: number
	personId: string
}): Promise<
	Result<object, { ok: false; reason: "no-such-order" } | { ok: false; reason: "too-late"; state: OrderState }>
> {
	const { producerId, number, personId } = query
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (order.state === "cancelled") return { ok: true }
		if (!canMove(order.state, "cancelled")) return { ok: false, reason: "too-late", state: order.state }
		if (order.state === "packed") await unpack(tx, { order, personId })
		await tx
			.delete(outboxMails)
			.where(
				and(
					eq(outboxMails.producerId, producerId),
					eq(outboxMails.onceKey, confirmationKey(order.id)),
					isNull(outboxMails.sentAt),
				),
			)
		await tx
			.update(orders)
			.set({ state: "cancelled" })
			.where(and(eq(orders.producerId, producerId), eq(orders.id, order.id)))
		await recordChange(tx, {
			producerId,
			orderId: order.id,
			kind: "cancelled",
			userId: personId,
			detail: { from: order.state },
		})
		return { ok: true }
	})
}

async function unpack(tx: Tx, { order, personId }: { order: LockedOrder; personId: string }): Promise<void> {
	const { producerId } = order
	const reason = `order ${order.number} was cancelled`
	await movePacked(tx, { producerId, orderId: order.id, to: "ready", reason, personId })
	const lineIds = order.lines.map((line) => line.id)
	await tx
		.delete(orderLineLots)
		.where(and(eq(orderLineLots.producerId, producerId), inArray(orderLineLots.orderLineId, lineIds)))
}
