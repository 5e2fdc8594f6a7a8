import { and, eq } from "drizzle-orm"
import { auditEntries, orderEvents, orders } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { isOpenToChange, type OrderState } from "~/domain/orders/order-states"
import type { Result } from "~/domain/result"
import { deliveryDayOn, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"

/**
 * Cancels a store's own order, while it is only placed and before last orders; what it was promised is free again.
 * Cancelling a cancelled order is no refusal, so that a second click does no harm. Recorded with who and when.
 */
export function cancelOrder(query: {
	producerId: string
	storeId: string
	number: number
	personId: string
	now: Date
	zone: string
}): Promise<Result<object, { ok: false; reason: "unknown" } | { ok: false; reason: "too-late"; state: OrderState }>> {
	const { producerId, storeId, number, personId: userId, now } = query
	return withProducer(producerId, async (tx) => {
		const [order] = await tx
			.select({ id: orders.id, state: orders.state, deliveryOn: orders.deliveryOn })
			.from(orders)
			.where(and(eq(orders.producerId, producerId), eq(orders.storeId, storeId), eq(orders.number, number)))
			.for("update")
		if (!order) return { ok: false, reason: "unknown" }
		if (order.state === "cancelled") return { ok: true }
		const day = deliveryDayOn(await findDeliverySchedule(tx, query), order.deliveryOn)
		if (!day || !isOpenToChange(order.state, day.cutoffAt, now)) {
			return { ok: false, reason: "too-late", state: order.state }
		}
		await tx
			.update(orders)
			.set({ state: "cancelled" })
			.where(and(eq(orders.producerId, producerId), eq(orders.id, order.id)))
		await tx.insert(orderEvents).values({ producerId, orderId: order.id, kind: "cancelled", at: now, userId })
		await tx.insert(auditEntries).values({
			producerId,
			at: now,
			userId,
			action: "cancel-order",
			subjectType: "order",
			subjectId: order.id,
			detail: { number, from: order.state },
		})
		return { ok: true }
	})
}
