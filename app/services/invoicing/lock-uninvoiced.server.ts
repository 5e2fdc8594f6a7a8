import { and, asc, eq, sql } from "drizzle-orm"
import { orderLines, orders, products, stores } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { LockedOrder } from "~/services/orders/lock-order.server"

/**
 * Locks a store and its orders that were sent, are on no invoice, and were for delivery on `until` or before; the earliest
 * delivery first. Two who invoice one store do it one after the other. Empty when there is nothing to invoice.
 */
export async function lockUninvoiced(
	tx: Tx,
	query: { producerId: string; storeId: string; until: Day },
): Promise<LockedOrder[]> {
	const { producerId, storeId, until } = query
	const [store] = await tx
		.select()
		.from(stores)
		.where(and(eq(stores.producerId, producerId), eq(stores.id, storeId)))
		.for("no key update")
	if (!store) return []
	const sent = await tx
		.select()
		.from(orders)
		.where(
			and(
				eq(orders.producerId, producerId),
				eq(orders.storeId, storeId),
				sql`${orders.state} in ('sent', 'received') and ${orders.deliveryOn} <= ${until}
					and not exists (select from invoice_orders x
						where x.producer_id = ${orders.producerId} and x.order_id = ${orders.id})`,
			),
		)
		.orderBy(asc(orders.id))
		.for("update")
	if (sent.length === 0) return []
	const lines = await tx
		.select({ line: orderLines, product: products })
		.from(orderLines)
		.innerJoin(products, and(eq(products.producerId, orderLines.producerId), eq(products.id, orderLines.productId)))
		.where(
			and(
				eq(orderLines.producerId, producerId),
				sql`${orderLines.orderId} = any(${sql.param(sent.map(({ id }) => id))}::uuid[])`,
			),
		)
		.orderBy(asc(products.code))
	return sent
		.toSorted((a, b) => a.deliveryOn.localeCompare(b.deliveryOn) || a.number - b.number)
		.map((order) => ({
			...order,
			store,
			lines: lines.filter(({ line }) => line.orderId === order.id).map(({ line, product }) => ({ ...line, product })),
		}))
}
