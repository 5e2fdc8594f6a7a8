import { and, eq } from "drizzle-orm"
import { orderDrafts, users } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** A half-filled sheet, field by field as it was typed, and who wrote on it last. */
export type OrderDraft = { fields: Record<string, string>; by: { id: string; name: string }; at: Date }

/** The half-filled sheet of a store for one day; null when there is none. One statement. */
export async function findDraft(
	tx: Tx,
	query: { producerId: string; storeId: string; deliveryOn: Day },
): Promise<OrderDraft | null> {
	const [draft] = await tx
		.select({ fields: orderDrafts.fields, id: users.id, name: users.name, at: orderDrafts.updatedAt })
		.from(orderDrafts)
		.innerJoin(users, eq(users.id, orderDrafts.updatedBy))
		.where(
			and(
				eq(orderDrafts.producerId, query.producerId),
				eq(orderDrafts.storeId, query.storeId),
				eq(orderDrafts.deliveryOn, query.deliveryOn),
			),
		)
	return draft ? { fields: draft.fields, by: { id: draft.id, name: draft.name }, at: draft.at } : null
}
