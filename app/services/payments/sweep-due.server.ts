import { sql } from "drizzle-orm"
import { withPlatform } from "~/db/transaction.server"

/** Queues taking what is due for every producer; one that still waits in the queue is not queued twice. */
export async function sweepDue(): Promise<void> {
	await withPlatform((tx) =>
		tx.execute(sql`
			select jobs.enqueue('charge-due', json_build_object('producerId', id), null, 'charge-due:' || id) from producers`),
	)
}
