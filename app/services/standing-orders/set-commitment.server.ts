import { and, eq, isNull } from "drizzle-orm"
import { auditEntries, standingOrders } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"

/**
 * The producer says whether a store's standing order counts as a commitment made before the season, which is served first
 * when the crop is short. False where the store has no standing order. Recorded with who and when.
 */
export function setCommitment(query: {
	producerId: string
	storeId: string
	personId: string
	isCommitment: boolean
	now: Date
}): Promise<boolean> {
	const { producerId, storeId, isCommitment } = query
	return withProducer(producerId, async (tx) => {
		const [standing] = await tx
			.update(standingOrders)
			.set({ isCommitment })
			.where(
				and(
					eq(standingOrders.producerId, producerId),
					eq(standingOrders.storeId, storeId),
					isNull(standingOrders.endedAt),
				),
			)
			.returning({ id: standingOrders.id })
		if (!standing) return false
		await tx.insert(auditEntries).values({
			producerId,
			at: query.now,
			userId: query.personId,
			action: "set-standing-commitment",
			subjectType: "standing-order",
			subjectId: standing.id,
			detail: { isCommitment },
		})
		return true
	})
}
