import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { FreezingFacts } from "~/domain/cold-room/frozen-pieces"

/** An accepted proof of the freezing of a load that held the lot. */
export type AcceptedProof = {
	id: string
	loadNumber: number
	kind: "entry" | "logger"
	/** The row of the freezing table that decided: tenths of a degree Celsius. */
	rowTenthsC: number
	heldMinutes: number
	enteredAt: Date
}

/** A row as it comes inside JSON: its moments are text. */
export type Json<Row> = {
	[Field in keyof Row]: Row[Field] extends Date ? string : Row[Field] extends Date | null ? string | null : Row[Field]
}

type Found = {
	lots: Json<FreezingFacts["lots"][number]>[]
	links: Json<FreezingFacts["links"][number]>[]
	loads: (Json<FreezingFacts["proven"][number]> & { proof: Json<AcceptedProof> })[]
}

/**
 * The lots and all lots that they came from, with their loads and the proofs of these, in one statement. Proofs come with
 * those of the lots themselves first, the latest before the earlier.
 */
export async function readFreezing(
	tx: Tx,
	{ producerId, lotIds }: { producerId: string; lotIds: readonly string[] },
): Promise<{ facts: FreezingFacts; proofs: AcceptedProof[] }> {
	const asked = sql`${sql.param(lotIds)}::uuid[]`
	const {
		rows: [found],
	} = await tx.execute<Found>(sql`
		with recursive family as (
			select id as lot_id from unnest(${asked}) as id
			union
			select k.from_lot_id from lot_links k join family f on k.producer_id = ${producerId} and k.to_lot_id = f.lot_id
		), proven as (
			select m.lot_id, m.pieces, d.number, p.*
			from family f
			join freezer_load_lots m on m.producer_id = ${producerId} and m.lot_id = f.lot_id
			join freezer_loads d on d.producer_id = m.producer_id and d.id = m.load_id
			join lateral (
				select q.id, q.kind, q.row_tenths_c, q.held_minutes, q.run_to, q.created_at from freeze_proofs q
				where q.producer_id = d.producer_id and q.load_id = d.id and q.is_accepted
				order by q.created_at, q.id limit 1
			) p on true
		)
		select
			(select coalesce(json_agg(json_build_object('lotId', l.id, 'piecesHarvested', l.pieces_harvested,
					'releasedAt', r.released_at)), '[]')
				from family f join lots l on l.producer_id = ${producerId} and l.id = f.lot_id
				left join lot_releases r on r.producer_id = l.producer_id and r.lot_id = l.id) as lots,
			(select coalesce(json_agg(json_build_object('fromLotId', k.from_lot_id, 'toLotId', k.to_lot_id,
					'piecesMade', k.pieces_made, 'at', k.at)), '[]')
				from family f join lot_links k on k.producer_id = ${producerId} and k.to_lot_id = f.lot_id) as links,
			(select coalesce(json_agg(json_build_object('lotId', p.lot_id, 'pieces', p.pieces,
					'provenBy', coalesce(p.run_to, p.created_at), 'proof', json_build_object('id', p.id, 'loadNumber', p.number,
						'kind', p.kind, 'rowTenthsC', p.row_tenths_c, 'heldMinutes', p.held_minutes, 'enteredAt', p.created_at))
					order by p.lot_id = any(${asked}) desc, p.created_at desc), '[]') from proven p) as loads`)
	if (!found) throw new Error("a query of one row gave none")
	return {
		facts: {
			lots: found.lots.map((lot) => ({
				...lot,
				releasedAt: lot.releasedAt === null ? null : new Date(lot.releasedAt),
			})),
			links: found.links.map((link) => ({ ...link, at: new Date(link.at) })),
			proven: found.loads.map(({ proof: _, ...load }) => ({ ...load, provenBy: new Date(load.provenBy) })),
		},
		proofs: found.loads.map(({ proof }) => ({ ...proof, enteredAt: new Date(proof.enteredAt) })),
	}
}
