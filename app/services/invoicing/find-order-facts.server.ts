import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"

/** The codes of the lots that fill each line, by line id: "R09, R11". */
export async function findLotCodes(
	tx: Tx,
	query: { producerId: string; orderIds: readonly string[] },
): Promise<Map<string, string>> {
	const { rows } = await tx.execute<{ lineId: string; codes: string }>(sql`
		select e.id as "lineId", string_agg(l.code, ', ' order by l.best_before_on, l.code) as codes
		from order_lines e
		join order_line_lots f on f.producer_id = e.producer_id and f.order_line_id = e.id
		join lots l on l.producer_id = f.producer_id and l.id = f.lot_id
		where e.producer_id = ${query.producerId} and e.order_id = any(${sql.param([...query.orderIds])}::uuid[])
		group by e.id`)
	return new Map(rows.map(({ lineId, codes }) => [lineId, codes]))
}

/** What the store was told when each order was confirmed, by order id; missing where nothing was short. */
export async function findShortNotes(
	tx: Tx,
	query: { producerId: string; orderIds: readonly string[] },
): Promise<Map<string, string>> {
	const { rows } = await tx.execute<{ orderId: string; note: string | null }>(sql`
		select distinct on (order_id) order_id as "orderId", detail ->> 'shortNote' as note from order_events
		where producer_id = ${query.producerId} and kind = 'confirmed'
			and order_id = any(${sql.param([...query.orderIds])}::uuid[])
		order by order_id, at desc`)
	return new Map(rows.map(({ orderId, note }) => [orderId, note ?? ""]))
}
