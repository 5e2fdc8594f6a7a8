import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

/** The producer as whoever issues invoices needs it. Throws when there is none: a job names one that is there. */
export function findInvoicingProducer(producerId: string): Promise<{ id: string; slug: string; timeZone: string }> {
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ id: string; slug: string; timeZone: string }>(sql`
			select id, slug, time_zone as "timeZone" from producers where id = ${producerId}`)
		if (!rows[0]) throw new Error("no such producer")
		return rows[0]
	})
}
