import { sql } from "drizzle-orm"
import { withPlatform } from "~/db/transaction.server"

/** Queues the nightly forecast of every producer; one that still waits in the queue is not queued twice. */
export async function sweepExpected(): Promise<void> {
	await withPlatform((tx) =>
		tx.execute(sql`
			select jobs.enqueue('refresh-expected', json_build_object('producerId', id), null, 'expected:' || id)
			from producers`),
	)
}
