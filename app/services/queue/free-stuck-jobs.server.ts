import { sql } from "drizzle-orm"
import { withPlatform } from "~/db/transaction.server"

/**
 * Gives back jobs whose worker was killed in the middle of them. A job takes seconds, so one that has been held for two
 * minutes is held by nobody; should its worker live after all, the job's own row locks keep it from doing harm twice.
 */
export async function freeStuckJobs(): Promise<void> {
	await withPlatform((tx) => tx.execute(sql`select jobs.free_stuck(interval '2 minutes')`))
}
