import { sql } from "drizzle-orm"
import { withPlatform } from "~/db/transaction.server"

/** Queues the making of due standing orders for every producer; one that still waits in the queue is not queued twice. */
export async function sweepStandingOrders(): Promise<void> {
	await withPlatform((tx) =>
		tx.execute(sql`
			select jobs.enqueue('make-standing-orders', json_build_object('producerId', id), null, 'standing-orders:' || id)
			from producers`),
	)
}
