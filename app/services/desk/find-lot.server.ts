import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { harvestedEqualsPlaces, type Place } from "~/domain/stock/places"
import { findReleaseState, type ReleaseState } from "~/services/cold-room/find-release-state.server"
import type { LotState } from "./list-lots.server"

/** Pieces of a lot in one place; `of` names the order or the market day that the place is about. */
export type LotPlace = { place: Place; of: string | null; orderNumber: number | null; pieces: number }

/** A lot next to this one: it came from it, or went into it. */
export type LotNeighbour = {
	code: string
	kind: "split" | "merge" | "cut-up"
	isSource: boolean
	pieces: number
	piecesMade: number
}

export type Lot = {
	code: string
	productName: string
	detail: string
	state: LotState
	yard: string
	/** The harvest's own word, or what the product says. */
	flora: string
	grade: string
	moistureTenths: number | null
	pfundTenths: number | null
	harvestedOn: Day
	expectedReleaseOn: Day
	bestBeforeOn: Day
	piecesHarvested: number
	piecesPerCase: number
	/** Hives whose supers went into the lot, by yard and label. */
	supers: { hive: string; yard: string; finishedPieces: number | null }[]
	neighbours: LotNeighbour[]
	withdrawalNumber: number | null
	places: LotPlace[]
	/** Whether every piece that was harvested is somewhere. */
	isComplete: boolean
	release: ReleaseState
}

/** One lot by its code, with where its pieces are and what stands between it and its release; null when there is none. */
export function findLot(query: { producerId: string; code: string }): Promise<Lot | null> {
	const { producerId, code } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [lot],
		} = await tx.execute<Omit<Lot, "places" | "isComplete" | "release"> & { id: string }>(sql`
			select l.id, l.code, p.name as "productName", p.detail, l.state, l.yard,
				coalesce(nullif(l.flora, ''), p.flora) as flora, l.grade, l.moisture_tenths as "moistureTenths",
				l.pfund_tenths as "pfundTenths", l.harvested_on::text as "harvestedOn",
				l.expected_release_on::text as "expectedReleaseOn", l.best_before_on::text as "bestBeforeOn",
				l.pieces_harvested as "piecesHarvested", p.pieces_per_case as "piecesPerCase",
				(select coalesce(json_agg(json_build_object('hive', h.label, 'yard', y.name, 'finishedPieces', u.finished_pieces)
					order by y.name, h.label), '[]'::json)
					from supers u
					join hives h on h.producer_id = u.producer_id and h.id = u.hive_id
					join yards y on y.producer_id = h.producer_id and y.id = h.yard_id
					where u.producer_id = l.producer_id and u.harvest_id = l.harvest_id and u.product_id = l.product_id
				) as supers,
				(select coalesce(json_agg(json_build_object('code', n.code, 'kind', k.kind, 'isSource', k.to_lot_id = l.id,
					'pieces', k.pieces, 'piecesMade', k.pieces_made) order by k.at, k.id), '[]'::json)
					from lot_links k
					join lots n on n.producer_id = k.producer_id and n.id in (k.from_lot_id, k.to_lot_id) and n.id <> l.id
					where k.producer_id = l.producer_id and (k.from_lot_id = l.id or k.to_lot_id = l.id)) as neighbours,
				(select w.number from withdrawal_lots x
					join withdrawals w on w.producer_id = x.producer_id and w.id = x.withdrawal_id
					where x.producer_id = l.producer_id and x.lot_id = l.id) as "withdrawalNumber"
			from lots l join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where l.producer_id = ${producerId} and l.code = ${code}`)
		if (!lot) return null
		const { rows: places } = await tx.execute<LotPlace>(sql`
			select b.place, b.pieces, o.number as "orderNumber",
				coalesce(s.name, m.name || ', ' || to_char(d.market_on, 'FMMonth FMDD'), n.code) as of
			from stock_balances b
			left join orders o on o.producer_id = b.producer_id and o.id = b.place_ref
			left join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			left join market_days d on d.producer_id = b.producer_id and d.id = b.place_ref
			left join markets m on m.producer_id = d.producer_id and m.id = d.market_id
			left join lots n on n.producer_id = b.producer_id and n.id = b.place_ref
			where b.producer_id = ${producerId} and b.lot_id = ${lot.id} and b.pieces > 0
			order by array_position(array['cold-room', 'ready', 'packed', 'van', 'market', 'sold', 'waste', 'cut-up',
				'other-lot', 'missing'], b.place), o.number, of`)
		const { id: lotId, ...facts } = lot
		return {
			...facts,
			places,
			isComplete: harvestedEqualsPlaces(lot.piecesHarvested, places),
			release: await findReleaseState(tx, { producerId, lotId }),
		}
	})
}
