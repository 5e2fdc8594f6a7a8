import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** So many of the store's last orders with a product decide what is usual. */
const LAST_ORDERS = 5

/** An order of the store to begin a sheet with. `pieces` are those that free to promise holds for the line. */
export type NamedOrder = {
	number: number
	deliveryOn: Day
	poNumber: string
	note: string
	lines: { productId: string; askedCases: number; leastCases: number; isToShare: boolean; pieces: number }[]
}

/**
 * The median of the cases that a store asked for in its last five orders with a product, for deliveries before a day: the
 * lower of the two in the middle of an even number. Cancelled orders do not count. One statement.
 */
export async function findUsualCases(
	tx: Tx,
	query: { producerId: string; storeId: string; before: Day },
): Promise<Map<string, number>> {
	const { rows } = await tx.execute<{ productId: string; cases: number }>(sql`
		select product_id as "productId", percentile_disc(0.5) within group (order by asked_cases)::int as cases
		from (
			select l.product_id, l.asked_cases,
				row_number() over (partition by l.product_id order by o.delivery_on desc, o.number desc) as place
			from (
				select id, delivery_on, number from orders
				where producer_id = ${query.producerId} and store_id = ${query.storeId} and state <> 'cancelled'
					and delivery_on < ${query.before}
				order by delivery_on desc, id desc limit 30
			) o
			join order_lines l on l.producer_id = ${query.producerId} and l.order_id = o.id
		) asked
		where place <= ${LAST_ORDERS}
		group by product_id`)
	return new Map(rows.map((row) => [row.productId, row.cases]))
}

/** The store's order of that number with what each line asked and holds; null when it has none. One statement. */
export async function findNamedOrder(
	tx: Tx,
	query: { producerId: string; storeId: string; number: number },
): Promise<NamedOrder | null> {
	const { rows } = await tx.execute<{
		deliveryOn: Day
		poNumber: string
		note: string
		lines: NamedOrder["lines"]
	}>(sql`
		select o.delivery_on::text as "deliveryOn", o.po_number as "poNumber", o.note,
			json_agg(json_build_object('productId', l.product_id, 'askedCases', l.asked_cases, 'leastCases', l.least_cases,
				'isToShare', l.is_to_share, 'pieces', l.pieces_per_case * case
					when o.state not in ('placed', 'confirmed') then 0
					else coalesce(l.given_cases, case when l.is_to_share then l.promised_cases else l.asked_cases end)
				end)) as lines
		from orders o
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		where o.producer_id = ${query.producerId} and o.store_id = ${query.storeId} and o.number = ${query.number}
		group by o.producer_id, o.id`)
	const [order] = rows
	return order ? { number: query.number, ...order } : null
}
