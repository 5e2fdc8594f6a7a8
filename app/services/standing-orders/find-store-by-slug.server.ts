import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

/** A store of a producer by the name it has in addresses, or null. */
export function findStoreBySlug(query: {
	producerId: string
	slug: string
}): Promise<{ id: string; name: string } | null> {
	return readProducer(query.producerId, async (tx) => {
		const { rows } = await tx.execute<{ id: string; name: string }>(
			sql`select id, name from stores where producer_id = ${query.producerId} and slug = ${query.slug}`,
		)
		return rows[0] ?? null
	})
}
