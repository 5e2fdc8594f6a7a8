import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/**
 * `day`, or the first day that is still open where the books are closed beyond it: what Stripe says of an earlier day is
 * entered on that one.
 */
export async function openDay(tx: Tx, query: { producerId: string; day: Day }): Promise<Day> {
	const { rows } = await tx.execute<{ day: Day }>(sql`
		select greatest(${query.day}::date, max(closed_until) + 1)::text as day from book_closings
		where producer_id = ${query.producerId}`)
	return rows[0]?.day ?? query.day
}
