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
 * are left out. The round is the one of the delivery's weekday.
 */
export function findWhereBroken(query: { producerId: string; from: Day; to: Day; by: BrokenBy }): Promise<BrokenRow[]> {
	const { producerId, from, to, by } = query
	const { key, of } = KEYS[by]
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<BrokenRow>(sql`
			with gone as materialized (
				select o.producer_id, o.id, o.delivery_on from orders o
				where o.producer_id = ${producerId} and o.delivery_on between ${from}::date and ${to}::date
					and o.state in ('sent', 'received')
			),
			counted as (
				select g.id as order_id, x.lot_id, x.pieces as sent, 0 as broken
				from gone g
				join order_lines e on e.producer_id = g.producer_id and e.order_id = g.id
				join order_line_lots x on x.producer_id = e.producer_id and x.order_line_id = e.id
				union all
				select g.id, m.lot_id, 0, m.pieces
				from gone g
				join stock_moves m on m.producer_id = g.producer_id and m.to_ref = g.id and m.from_place = 'sold'
					and m.to_place = 'waste' and m.to_ref <> '00000000-0000-0000-0000-000000000000'
			)
			select ${key} as key, ${of} as of, sum(c.sent)::int as "sentPieces", sum(c.broken)::int as "brokenPieces"
			from counted c
			join gone g on g.id = c.order_id
			join lots l on l.producer_id = ${producerId} and l.id = c.lot_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			left join delivery_rounds r on r.producer_id = ${producerId} and r.weekday = extract(isodow from g.delivery_on)
			group by 1, 2
			${by === "lot" ? sql`having sum(c.broken) > 0` : sql``}
			order by sum(c.broken) desc, sum(c.sent) desc, 1`)
		return rows
	})
}
