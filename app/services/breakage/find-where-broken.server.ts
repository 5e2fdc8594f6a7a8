import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** By what the broken pieces are counted. */
export type BrokenBy = "lot" | "round" | "product"

/** A lot, a delivery round or a product with what was sent and what of it arrived broken, in pieces. */
export type BrokenRow = {
	/** The lot's code, the round's name, the product's number. */
	key: string
	/** What it is of: the product of a lot; empty for a round. */
	of: string
	sentPieces: number
	brokenPieces: number
}

const KEYS: Record<BrokenBy, { key: ReturnType<typeof sql>; of: ReturnType<typeof sql> }> = {
	lot: { key: sql`l.code`, of: sql`p.name || coalesce(', ' || nullif(p.detail, ''), '')` },
	round: { key: sql`coalesce(r.name, 'Other days')`, of: sql`''` },
	product: { key: sql`p.code`, of: sql`p.name || coalesce(', ' || nullif(p.detail, ''), '')` },
}

/**
 * What of the orders delivered from `from` to `to` arrived broken, by lot, by delivery round or by product: the pieces that
 * were accepted as broken and written off, beside those that were sent. Those with most broken pieces first; lots without any
 * are left out. The round is the one of the delivery's weekday. Summed step by step: joined in one go, a planner that knows
 * nothing of a new database yet visits every line for every order.
 */
export function findWhereBroken(query: { producerId: string; from: Day; to: Day; by: BrokenBy }): Promise<BrokenRow[]> {
	const { producerId, from, to, by } = query
	const { key, of } = KEYS[by]
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<BrokenRow>(sql`
			with gone as materialized (
				select o.id, o.delivery_on from orders o
				where o.producer_id = ${producerId} and o.delivery_on between ${from}::date and ${to}::date
					and o.state in ('sent', 'received')
			), lines as materialized (
				select e.id, g.delivery_on from order_lines e join gone g on g.id = e.order_id where e.producer_id = ${producerId}
			), counted as (
				select x.lot_id, extract(isodow from e.delivery_on) as weekday, x.pieces as sent, 0 as broken
				from order_line_lots x join lines e on e.id = x.order_line_id where x.producer_id = ${producerId}
				union all
				select m.lot_id, extract(isodow from g.delivery_on), 0, m.pieces
				from stock_moves m join gone g on g.id = m.to_ref
				where m.producer_id = ${producerId} and m.from_place = 'sold' and m.to_place = 'waste'
					and m.to_ref <> '00000000-0000-0000-0000-000000000000'
			), summed as materialized (
				select lot_id, weekday, sum(sent) as sent, sum(broken) as broken from counted group by 1, 2
			)
			select ${key} as key, ${of} as of, sum(c.sent)::int as "sentPieces", sum(c.broken)::int as "brokenPieces"
			from summed c
			join lots l on l.producer_id = ${producerId} and l.id = c.lot_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			left join delivery_rounds r on r.producer_id = ${producerId} and r.weekday = c.weekday
			group by 1, 2
			${by === "lot" ? sql`having sum(c.broken) > 0` : sql``}
			order by sum(c.broken) desc, sum(c.sent) desc, 1`)
		return rows
	})
}
