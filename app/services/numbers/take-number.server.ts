import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"

type Series = {
	producerId: string
	series: "order" | "invoice" | "credit" | "lot" | "load" | "withdrawal"
	year: number
}

/**
 * Takes the next number of a series. Gapless: the row stays locked until the transaction ends, and a rollback gives the
 * number back. Take it late, since others of the same series wait from here on.
 */
export async function takeNumber(tx: Tx, query: Series): Promise<number> {
	const { rows } = await tx.execute<{ last: number }>(sql`
		insert into counters (producer_id, series, year, last) values (${query.producerId}, ${query.series}, ${query.year}, 1)
		on conflict (producer_id, series, year) do update set last = counters.last + 1
		returning last`)
	const [row] = rows
	if (!row) throw new Error("an upsert always returns its row")
	return row.last
}

/** Takes the next `count` numbers of a series, one after the other, and answers the first of them. */
export async function takeNumbers(tx: Tx, query: Series & { count: number }): Promise<number> {
	const { producerId, series, year, count } = query
	const { rows } = await tx.execute<{ last: number }>(sql`
		insert into counters (producer_id, series, year, last) values (${producerId}, ${series}, ${year}, ${count})
		on conflict (producer_id, series, year) do update set last = counters.last + excluded.last
		returning last`)
	const [row] = rows
	if (!row) throw new Error("an upsert always returns its row")
	return row.last - count + 1
}
