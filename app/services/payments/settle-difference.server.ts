import { and, eq, isNull } from "drizzle-orm"
import { auditEntries, stripeDifferences } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { now } from "~/platform/clock.server"

/** A person has put a difference right, or has seen why it is there. Comes back at night where the two differ still. */
export async function settleDifference(query: {
	producerId: string
	differenceId: string
	personId: string
}): Promise<{ ok: boolean }> {
	const { producerId, differenceId, personId } = query
	return withProducer(producerId, async (tx) => {
		const [row] = await tx
			.update(stripeDifferences)
			.set({ settledAt: now() })
			.where(
				and(
					eq(stripeDifferences.producerId, producerId),
					eq(stripeDifferences.id, differenceId),
					isNull(stripeDifferences.settledAt),
				),
			)
			.returning({ stripeId: stripeDifferences.stripeId, kind: stripeDifferences.kind })
		if (!row) return { ok: false }
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "settle difference",
			subjectType: "stripe difference",
			subjectId: differenceId,
			detail: row,
		})
		return { ok: true }
	})
}
