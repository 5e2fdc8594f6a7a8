import { sql } from "drizzle-orm"
import { auditEntries } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"

/** How much a store counts in a sharing: 100 counts once, 200 twice. From 10 to 1000. */
export type StoreWeight = { storeId: string; percent: number }

/**
 * Sets how much stores count when a product is shared out. Noted in the audit trail for each store that changes; others
 * are left. Throws RangeError on a weight that is not whole or beyond 10 to 1000.
 */
export async function setWeights(query: {
	producerId: string
	personId: string
	weights: readonly StoreWeight[]
}): Promise<void> {
	const { producerId, personId, weights } = query
	for (const { percent } of weights)
		if (!Number.isInteger(percent) || percent < 10 || percent > 1000) throw new RangeError(`not a weight: ${percent}`)
	await withProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ id: string; percent: number }>(sql`
			update stores set sharing_weight_percent = weight.percent
			from unnest(${sql.param(weights.map(({ storeId }) => storeId))}::uuid[],
				${sql.param(weights.map(({ percent }) => percent))}::smallint[]) as weight(store_id, percent)
			where stores.producer_id = ${producerId} and stores.id = weight.store_id
				and stores.sharing_weight_percent <> weight.percent
			returning stores.id, weight.percent`)
		if (rows.length === 0) return
		await tx.insert(auditEntries).values(
			rows.map(({ id, percent }) => ({
				producerId,
				userId: personId,
				action: "set sharing weight",
				subjectType: "store",
				subjectId: id,
				detail: { percent },
			})),
		)
	})
}
