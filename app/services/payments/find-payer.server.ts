import { sql } from "drizzle-orm"
import type { onlinePayments } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

/** A try to take money through Stripe, as far as it says whose it is. */
export type Try = Pick<typeof onlinePayments.$inferSelect, "producerId" | "id" | "storeId" | "kind" | "startedBy">

/**
 * Who hears of what comes of a try: the person who started it, or who agreed that the store pays by itself; with what
 * every letter about it says. Null when nobody is to be told any more.
 */
export async function findPayer(tx: Tx, visit: Try) {
	const { producerId, storeId, startedBy } = visit
	const { rows } = await tx.execute<{ email: string; storeName: string; storeSlug: string; producerSlug: string }>(sql`
		select u.email, s.name as "storeName", s.slug as "storeSlug", p.slug as "producerSlug"
		from stores s
		join producers p on p.id = s.producer_id
		join users u on u.id = coalesce(${startedBy}::uuid, s.autopay_agreed_by)
		where s.producer_id = ${producerId} and s.id = ${storeId}`)
	const row = rows[0]
	if (!row) return null
	const yard = letterHead(await findYard(tx, producerId))
	const invoicesUrl = `${env.BASE_URL}/buy/${row.producerSlug}/${row.storeSlug}/invoices`
	return { email: row.email, head: { yard, sentTo: row.email, storeName: row.storeName, invoicesUrl } }
}
