import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"

export type SleepingStore = { slug: string; name: string; lastOn: Day; cents: number }

/**
 * Stores that ordered since the beginning of the last season and have nothing delivered or asked for within the last
 * `quietWeeks` or later, those that bought most since then first. The season is the calendar year.
 */
export async function findSleeping(
	tx: Tx,
	query: { producerId: string; today: Day; quietWeeks: number },
): Promise<SleepingStore[]> {
	const { producerId, today, quietWeeks } = query
	const since = `${Number(today.slice(0, 4)) - 1}-01-01`
	const quietFrom = addDays(today, -7 * quietWeeks)
	const { rows } = await tx.execute<SleepingStore>(sql`
		select s.slug, s.name, o.delivery_on::text as "lastOn", coalesce(b.cents, 0) as cents
		from stores s
		cross join lateral (
			select delivery_on from orders
			where producer_id = s.producer_id and store_id = s.id and state <> 'cancelled' order by delivery_on desc limit 1
		) as o
		cross join lateral (
			select sum(lines_cents) as cents from invoices
			where producer_id = s.producer_id and store_id = s.id and kind = 'goods' and issued_on >= ${since}::date
		) as b
		where s.producer_id = ${producerId} and s.is_active
			and o.delivery_on >= ${since}::date and o.delivery_on < ${quietFrom}::date
		order by coalesce(b.cents, 0) desc, s.name, s.id`)
	return rows.map((row) => ({ ...row, cents: Number(row.cents) }))
}
