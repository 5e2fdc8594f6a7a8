import { and, eq } from "drizzle-orm"
import { onlinePayments } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"

export type FoundVisit = Pick<
	typeof onlinePayments.$inferSelect,
	"kind" | "method" | "state" | "amountCents" | "declineMessage"
>

const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

/** How a visit of the store to the hosted page stands, for whoever comes back from it; null when there is no such visit. */
export async function findVisit(query: {
	producerId: string
	storeId: string
	visitId: string | null
}): Promise<FoundVisit | null> {
	const { producerId, storeId, visitId } = query
	if (!visitId || !uuid.test(visitId)) return null
	return readProducer(producerId, async (tx) => {
		const { kind, method, state, amountCents, declineMessage } = onlinePayments
		const [visit] = await tx
			.select({ kind, method, state, amountCents, declineMessage })
			.from(onlinePayments)
			.where(
				and(
					eq(onlinePayments.producerId, producerId),
					eq(onlinePayments.storeId, storeId),
					eq(onlinePayments.id, visitId),
				),
			)
		return visit ?? null
	})
}
