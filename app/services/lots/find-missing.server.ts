import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { type FreezingFacts, frozenPieces } from "~/domain/cold-room/frozen-pieces"

export type MissingForRelease = "freezing" | "weighing"

type Found = {
	lots: { lotId: string; piecesHarvested: number; releasedAt: string | null }[]
	links: { fromLotId: string; toLotId: string; piecesMade: number; at: string }[]
	proven: { lotId: string; pieces: number; provenBy: string }[]
	asked: { lotId: string; shelfPieces: number; hasPassed: boolean }[]
}

/**
 * What still stands between each of these lots and its release, for a page of a list in one statement; by the same rule as
 * the release itself: frozen are as many pieces as lie on the shelves, and the latest weighing passed.
 */
export async function findMissing(
	tx: Tx,
	query: { producerId: string; lotIds: readonly string[] },
): Promise<Map<string, MissingForRelease[]>> {
	const { producerId, lotIds } = query
	if (lotIds.length === 0) return new Map()
	const {
		rows: [found],
	} = await tx.execute<Found>(sql`
		with recursive family as (
			select id as lot_id from unnest(${sql.param(lotIds)}::uuid[]) as id
			union
			select k.from_lot_id from lot_links k join family f on k.producer_id = ${producerId} and k.to_lot_id = f.lot_id
		)
		select
			(select coalesce(json_agg(json_build_object('lotId', l.id, 'piecesHarvested', l.pieces_harvested,
					'releasedAt', r.released_at)), '[]')
				from family f join lots l on l.producer_id = ${producerId} and l.id = f.lot_id
				left join lot_releases r on r.producer_id = l.producer_id and r.lot_id = l.id) as lots,
			(select coalesce(json_agg(json_build_object('fromLotId', k.from_lot_id, 'toLotId', k.to_lot_id,
					'piecesMade', k.pieces_made, 'at', k.at)), '[]')
				from family f join lot_links k on k.producer_id = ${producerId} and k.to_lot_id = f.lot_id) as links,
			(select coalesce(json_agg(json_build_object('lotId', m.lot_id, 'pieces', m.pieces,
					'provenBy', coalesce(p.run_to, p.created_at))), '[]')
				from family f
				join freezer_load_lots m on m.producer_id = ${producerId} and m.lot_id = f.lot_id
				join lateral (
					select q.run_to, q.created_at from freeze_proofs q
					where q.producer_id = m.producer_id and q.load_id = m.load_id and q.is_accepted
					order by q.created_at, q.id limit 1
				) p on true) as proven,
			(select coalesce(json_agg(json_build_object('lotId', id, 'shelfPieces', coalesce(b.pieces, 0),
					'hasPassed', coalesce(c.has_passed, false))), '[]')
				from unnest(${sql.param(lotIds)}::uuid[]) as id
				left join lateral (
					select sum(s.pieces)::int as pieces from stock_balances s
					where s.producer_id = ${producerId} and s.lot_id = id and s.place in ('cold-room', 'ready')
				) b on true
				left join lateral (
					select n.has_passed from net_checks n where n.producer_id = ${producerId} and n.lot_id = id
					order by n.created_at desc, n.id desc limit 1
				) c on true) as asked`)
	if (!found) throw new Error("a query of one row gave none")
	const facts: FreezingFacts = {
		lots: found.lots.map((lot) => ({ ...lot, releasedAt: lot.releasedAt === null ? null : new Date(lot.releasedAt) })),
		links: found.links.map((link) => ({ ...link, at: new Date(link.at) })),
		proven: found.proven.map((load) => ({ ...load, provenBy: new Date(load.provenBy) })),
	}
	return new Map(
		found.asked.map(({ lotId, shelfPieces, hasPassed }) => {
			const frozen = frozenPieces(lotId, facts)
			const isFrozen = frozen > 0 && frozen >= shelfPieces
			return [lotId, [...(isFrozen ? [] : (["freezing"] as const)), ...(hasPassed ? [] : (["weighing"] as const))]]
		}),
	)
}
