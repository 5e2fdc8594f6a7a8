import { sql } from "drizzle-orm"
import { withPlatform } from "~/db/transaction.server"

/** Queues the invoices of the month before for every producer; one that still waits in the queue is not queued twice. */
export async function sweepMonthEnds(): Promise<void> {
	await withPlatform((tx) =>
		tx.execute(sql`
			select jobs.enqueue('issue-month-ends', json_build_object('producerId', id), null, 'month-ends:' || id)
			from producers`),
	)
}
