import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { OrderState } from "~/domain/orders/order-states"
import type { Place } from "~/domain/stock/places"
import type { LotState } from "~/services/desk/list-lots.server"
import { descendantsOf } from "./lot-family.server"

/** A lot of the trace and where its pieces are now. `linkedPieces` are those of it that other lots say they got. */
export type TracedLot = {
	code: string
	productName: string
	detail: string
	state: LotState
	harvestedOn: Day
	piecesHarvested: number
	linkedPieces: number
	places: { place: Place; pieces: number }[]
}

/** How a lot of the trace came from another. */
export type TracedLink = {
	from: string
	to: string
	kind: "split" | "merge" | "cut-up"
	pieces: number
	piecesMade: number
}

/** An order with pieces of a lot in it. */
export type TracedOrder = {
	number: number
	state: OrderState
	deliveryOn: Day
	storeId: string
	storeName: string
	lot: string
	pieces: number
}

/** A market day on which pieces of a lot were sold or stand on the table. */
export type TracedMarketDay = {
	id: string
	marketName: string
	marketOn: Day
	lot: string
	sold: number
	onTable: number
}

export type ForwardTrace = {
	/** The lot that was asked for, first, then those that came from it. */
	lots: TracedLot[]
	links: TracedLink[]
	orders: TracedOrder[]
	marketDays: TracedMarketDay[]
}

/** Everyone who had pieces of these lots or of lots made from them, and what is left where. One statement. */
export async function readForwardTrace(
	tx: Tx,
	query: { producerId: string; codes: readonly string[] },
): Promise<ForwardTrace> {
	const { producerId, codes } = query
	const { rows } = await tx.execute<ForwardTrace>(sql`
		with recursive ${descendantsOf(producerId, codes)},
		traced as materialized (
			select l.*, p.name as product_name, p.detail
			from family f
			join lots l on l.producer_id = ${producerId} and l.id = f.lot_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
		),
		sold as (
			select s.market_day_id as day_id, x.lot_id, sum(x.pieces)::int as sold, 0 as on_table
			from traced t
			join sale_line_lots x on x.producer_id = t.producer_id and x.lot_id = t.id
			join sales s on s.producer_id = x.producer_id and s.id = x.sale_id and s.state <> 'given-up'
			group by 1, 2
			union all
			select b.place_ref, b.lot_id, 0, b.pieces
			from traced t
			join stock_balances b on b.producer_id = t.producer_id and b.lot_id = t.id and b.place = 'market' and b.pieces > 0
		)
		select
			(select coalesce(json_agg(json_build_object(
				'code', t.code, 'productName', t.product_name, 'detail', t.detail, 'state', t.state,
				'harvestedOn', t.harvested_on, 'piecesHarvested', t.pieces_harvested,
				'linkedPieces', (select coalesce(sum(k.pieces), 0) from lot_links k
					where k.producer_id = t.producer_id and k.from_lot_id = t.id and k.kind <> 'cut-up'),
				'places', (select coalesce(json_agg(json_build_object('place', b.place, 'pieces', b.pieces)), '[]'::json)
					from (select place, sum(pieces)::int as pieces from stock_balances b
						where b.producer_id = t.producer_id and b.lot_id = t.id and b.pieces > 0 group by place) b)
			) order by not t.code = any(${sql.param(codes)}::text[]), t.harvested_on, t.code), '[]'::json) from traced t) as lots,
			(select coalesce(json_agg(json_build_object(
				'from', a.code, 'to', b.code, 'kind', k.kind, 'pieces', k.pieces, 'piecesMade', k.pieces_made
			) order by k.at, k.id), '[]'::json)
				from traced a
				join lot_links k on k.producer_id = a.producer_id and k.from_lot_id = a.id
				join traced b on b.id = k.to_lot_id) as links,
			(select coalesce(json_agg(json_build_object(
				'number', o.number, 'state', o.state, 'deliveryOn', o.delivery_on,
				'storeId', s.id, 'storeName', s.name, 'lot', t.code, 'pieces', x.pieces
			) order by o.delivery_on, s.name, o.number, t.code), '[]'::json)
				from traced t
				join order_line_lots x on x.producer_id = t.producer_id and x.lot_id = t.id
				join order_lines e on e.producer_id = x.producer_id and e.id = x.order_line_id
				join orders o on o.producer_id = e.producer_id and o.id = e.order_id
				join stores s on s.producer_id = o.producer_id and s.id = o.store_id) as orders,
			(select coalesce(json_agg(json_build_object(
				'id', d.id, 'marketName', m.name, 'marketOn', d.market_on, 'lot', t.code,
				'sold', x.sold, 'onTable', x.on_table
			) order by d.market_on, m.name, t.code), '[]'::json)
				from (select day_id, lot_id, sum(sold)::int as sold, sum(on_table)::int as on_table from sold group by 1, 2) x
				join traced t on t.id = x.lot_id
				join market_days d on d.producer_id = ${producerId} and d.id = x.day_id
				join markets m on m.producer_id = d.producer_id and m.id = d.market_id) as "marketDays"`)
	const [trace] = rows
	if (!trace) throw new Error("a statement without a from answers one row")
	return trace
}

/** The forward trace of one lot by its code; null when the producer has none of that code. */
export async function findForwardTrace(query: { producerId: string; code: string }): Promise<ForwardTrace | null> {
	const { producerId, code } = query
	const trace = await readProducer(producerId, (tx) => readForwardTrace(tx, { producerId, codes: [code] }))
	return trace.lots.length === 0 ? null : trace
}
