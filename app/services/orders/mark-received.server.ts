import { and, eq } from "drizzle-orm"
import { orders } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { canMove } from "~/domain/orders/order-states"
import { lockOrder } from "./lock-order.server"
import { recordChange } from "./record-change.server"

/**
 * Notes that a sent order has arrived. With `storeId` the order must be that store's. Answers false when there is no
 * such order or it is not on its way.
 */
export async function markReceived(query: {
	producerId: string
	number: number
	personId: string
	storeId?: string
}): Promise<boolean> {
	const { producerId, number, personId, storeId } = query
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order || (storeId && order.storeId !== storeId) || !canMove(order.state, "received")) return false
		await tx
			.update(orders)
			.set({ state: "received" })
			.where(and(eq(orders.producerId, producerId), eq(orders.id, order.id)))
		await recordChange(tx, { producerId, orderId: order.id, kind: "received", userId: personId })
		return true
	})
}
