import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { harvestedEqualsPlaces, type Place } from "~/domain/stock/places"
import type { LotState } from "./list-lots.server"

/** Pieces of a lot in one place; `of` names the order or the market day that the place is about. */
export type LotPlace = { place: Place; of: string | null; orderNumber: number | null; pieces: number }

export type LotMove = {
	at: Date
	from: Place | null
	to: Place
	pieces: number
	reason: string
	who: string | null
}

export type Lot = {
	code: string
	productName: string
	detail: string
	state: LotState
	yard: string
	harvestedOn: Day
	expectedReleaseOn: Day
	bestBeforeOn: Day
	piecesHarvested: number
	piecesPerCase: number
	places: LotPlace[]
	/** The latest first, 200 at most. */
	moves: LotMove[]
	/** Whether every piece that was harvested is somewhere. */
	isComplete: boolean
}

/** One lot by its code, with where its pieces are and how they came there; null when the producer has none of that code. */
export function findLot(query: { producerId: string; code: string }): Promise<Lot | null> {
	const { producerId, code } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [lot],
		} = await tx.execute<Omit<Lot, "places" | "moves" | "isComplete"> & { id: string }>(sql`
			select l.id, l.code, p.name as "productName", p.detail, l.state, l.yard, l.harvested_on::text as "harvestedOn",
				l.expected_release_on::text as "expectedReleaseOn", l.best_before_on::text as "bestBeforeOn",
				l.pieces_harvested as "piecesHarvested", p.pieces_per_case as "piecesPerCase"
			from lots l join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where l.producer_id = ${producerId} and l.code = ${code}`)
		if (!lot) return null
		const { rows: places } = await tx.execute<LotPlace>(sql`
			select b.place, b.pieces, o.number as "orderNumber",
				coalesce(s.name, m.name || ', ' || to_char(d.market_on, 'FMMonth FMDD')) as of
			from stock_balances b
			left join orders o on o.producer_id = b.producer_id and o.id = b.place_ref
			left join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			left join market_days d on d.producer_id = b.producer_id and d.id = b.place_ref
			left join markets m on m.producer_id = d.producer_id and m.id = d.market_id
			where b.producer_id = ${producerId} and b.lot_id = ${lot.id} and b.pieces > 0
			order by array_position(
				array['cold-room', 'ready', 'packed', 'van', 'market', 'sold', 'waste', 'cut-up'], b.place), o.number, of`)
		const { rows: moves } = await tx.execute<Omit<LotMove, "at"> & { at: Date | string }>(sql`
			select v.moved_at as at, v.from_place as from, v.to_place as to, v.pieces, v.reason, u.name as who
			from stock_moves v left join users u on u.id = v.moved_by
			where v.producer_id = ${producerId} and v.lot_id = ${lot.id}
			order by v.moved_at desc, v.id desc
			limit 200`)
		const { id: _, ...facts } = lot
		return {
			...facts,
			places,
			moves: moves.map((move) => ({ ...move, at: new Date(move.at) })),
			isComplete: harvestedEqualsPlaces(lot.piecesHarvested, places),
		}
	})
}
