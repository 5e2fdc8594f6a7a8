import { and, eq, isNull, sql } from "drizzle-orm"
import { memberships, users } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

/** Who at a store is told of its orders and invoices: name and address, by name. */
export async function findStorePeople(
	tx: Tx,
	query: { producerId: string; storeId: string },
): Promise<{ id: string; name: string; email: string }[]> {
	return tx
		.selectDistinctOn([users.name, users.id], { id: users.id, name: users.name, email: users.email })
		.from(memberships)
		.innerJoin(users, eq(users.id, memberships.userId))
		.where(
			and(
				eq(memberships.producerId, query.producerId),
				eq(memberships.storeId, query.storeId),
				isNull(memberships.endedAt),
			),
		)
		.orderBy(sql`${users.name}, ${users.id}`)
}
