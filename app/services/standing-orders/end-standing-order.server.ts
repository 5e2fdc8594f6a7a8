import { and, eq, isNull } from "drizzle-orm"
import { auditEntries, standingOrders } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"

/** Ends the store's standing order: dates that have closed are still delivered, none after them. Ending twice does no harm. */
export function endStandingOrder(query: {
	producerId: string
	storeId: string
	personId: string
	now: Date
}): Promise<void> {
	const { producerId, storeId, personId, now } = query
	return withProducer(producerId, async (tx) => {
		const ended = await tx
			.update(standingOrders)
			.set({ endedAt: now })
			.where(
				and(
					eq(standingOrders.producerId, producerId),
					eq(standingOrders.storeId, storeId),
					isNull(standingOrders.endedAt),
				),
			)
			.returning({ id: standingOrders.id })
		if (ended.length === 0) return
		await tx.insert(auditEntries).values(
			ended.map(({ id }) => ({
				producerId,
				at: now,
				userId: personId,
				action: "end-standing-order",
				subjectType: "standing-order",
				subjectId: id,
			})),
		)
	})
}
