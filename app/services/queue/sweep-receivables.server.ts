import { sql } from "drizzle-orm"
import { withPlatform } from "~/db/transaction.server"

/** Queues the look at what is owed for every producer; one that still waits in the queue is not queued twice. */
export async function sweepReceivables(): Promise<void> {
	await withPlatform((tx) =>
		tx.execute(sql`
			select jobs.enqueue('chase-receivables', json_build_object('producerId', id, 'zone', time_zone), null,
				'receivables:' || id)
			from producers`),
	)
}
