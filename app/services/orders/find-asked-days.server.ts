import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { OrderState } from "~/domain/orders/order-states"

/** One line of an order of the store itself; `cases` are those given once that is decided, else those asked. */
export type OwnLine = { number: number; deliveryOn: Day; state: OrderState; productId: string; cases: number }

type Row = { number: number; delivery_on: Day; state: OrderState; product_id: string; cases: number }

/**
 * What the store has ordered, cancelled orders left out: all lines for the days `from` to `to`, and those of the last
 * delivery day before `lastBefore` on which it had any. One statement.
 */
export async function findOwnLines(
	tx: Tx,
	query: { producerId: string; storeId: string; from: Day; to: Day; lastBefore: Day },
): Promise<OwnLine[]> {
	const { producerId, storeId } = query
	const { rows } = await tx.execute<Row>(sql`
		select o.number, o.delivery_on::text, o.state, l.product_id, coalesce(l.given_cases, l.asked_cases)::int as cases
		from orders o
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		where o.producer_id = ${producerId} and o.store_id = ${storeId} and o.state <> 'cancelled' and (
			o.delivery_on between ${query.from} and ${query.to}
			or o.delivery_on = (
				select max(e.delivery_on) from orders e
				where e.producer_id = ${producerId} and e.store_id = ${storeId} and e.state <> 'cancelled'
					and e.delivery_on < ${query.lastBefore}))
		order by o.delivery_on, o.number`)
	return rows.map((row) => ({
		number: row.number,
		deliveryOn: row.delivery_on,
		state: row.state,
		productId: row.product_id,
		cases: row.cases,
	}))
}

/** Cases of each product that all stores have asked for on a day and that are still to be shared out. One statement. */
export async function findCasesToShare(
	tx: Tx,
	query: { producerId: string; deliveryOn: Day },
): Promise<Map<string, number>> {
	const { rows } = await tx.execute<{ product_id: string; cases: number }>(sql`
		select l.product_id, sum(l.asked_cases - l.promised_cases)::int as cases
		from orders o
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		where o.producer_id = ${query.producerId} and o.delivery_on = ${query.deliveryOn}
			and o.state in ('placed', 'confirmed') and l.is_to_share and l.given_cases is null
		group by l.product_id`)
	return new Map(rows.map((row) => [row.product_id, row.cases]))
}
