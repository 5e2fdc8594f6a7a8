import { and, asc, eq } from "drizzle-orm"
import { orderLines, orders, products, stores } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

export type LockedOrder = typeof orders.$inferSelect & { store: typeof stores.$inferSelect; lines: LockedLine[] }
export type LockedLine = typeof orderLines.$inferSelect & { product: typeof products.$inferSelect }

/**
 * Locks an order by its number, with its store and its lines in the order of the price list: two people who change one
 * order do it one after the other. Null when the producer has no such order.
 */
export async function lockOrder(tx: Tx, query: { producerId: string; number: number }): Promise<LockedOrder | null> {
	const { producerId, number } = query
	const [found] = await tx
		.select({ order: orders, store: stores })
		.from(orders)
		.innerJoin(stores, and(eq(stores.producerId, orders.producerId), eq(stores.id, orders.storeId)))
		.where(and(eq(orders.producerId, producerId), eq(orders.number, number)))
		.for("update", { of: orders })
	if (!found) return null
	const lines = await tx
		.select({ line: orderLines, product: products })
		.from(orderLines)
		.innerJoin(products, and(eq(products.producerId, orderLines.producerId), eq(products.id, orderLines.productId)))
		.where(and(eq(orderLines.producerId, producerId), eq(orderLines.orderId, found.order.id)))
		.orderBy(asc(products.code))
	return { ...found.order, store: found.store, lines: lines.map(({ line, product }) => ({ ...line, product })) }
}
