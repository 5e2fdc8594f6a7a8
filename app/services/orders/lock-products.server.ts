import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"

/**
 * Locks products against any other promise or packing of them until the transaction ends: whoever gives away supply
 * takes these locks first, in the order of ids, so that nobody gets the last case twice and nobody waits in a circle.
 */
export async function lockProducts(
	tx: Tx,
	query: { producerId: string; productIds: readonly string[] },
): Promise<void> {
	await tx.execute(sql`
		select id from products
		where producer_id = ${query.producerId} and id = any(${sql.param(query.productIds)}::uuid[])
		order by id for update`)
}
