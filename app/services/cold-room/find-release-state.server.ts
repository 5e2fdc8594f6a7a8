import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type FreezingFacts, frozenPieces } from "~/domain/cold-room/frozen-pieces"

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

export type ReleaseState = {
	/** What still stands between the lot and its release; empty for a lot that was released. */
	missing: ("freezing" | "weighing")[]
	/** Pieces in the cold room and on the ready shelf, and how many pieces of the lot were frozen long enough. */
	piecesOnShelves: number
	piecesFrozen: number
	/** The latest accepted proof, of the lot or of a lot it came from; null when there is none. */
	proof: AcceptedProof | null
	/** Loads that hold the lot and are not proven yet, the latest first. */
	openLoads: number[]
	/** The latest check of the net contents. */
	check: { id: string; checkedOn: Day; hasPassed: boolean } | null
	release: { kind: "proven" | "by-hand"; reason: string; who: string | null; releasedAt: Date } | null
}

type LotQuery = { producerId: string; lotId: string }

/**
 * What is known of a lot's release: its freezing counts once as many pieces were frozen long enough as lie on the
 * shelves, its weighing once the latest check of the net contents passed. A lot that was split off, merged or cut from
 * others keeps the freezing of those, and is weighed for itself.
 */
export async function findReleaseState(tx: Tx, query: LotQuery): Promise<ReleaseState> {
	const { facts, proofs, openLoads } = await findFreezing(tx, query)
	const { piecesOnShelves, check, release } = await findLotFacts(tx, query)
	const piecesFrozen = frozenPieces(query.lotId, facts)
	const isFrozen = proofs.length > 0 && piecesFrozen > 0 && piecesFrozen >= piecesOnShelves
	const missing = [...(isFrozen ? [] : (["freezing"] as const)), ...(check?.hasPassed ? [] : (["weighing"] as const))]
	return {
		missing: release ? [] : missing,
		piecesOnShelves,
		piecesFrozen,
		proof: piecesFrozen > 0 ? (proofs[0] ?? null) : null,
		openLoads,
		check,
		release,
	}
}

type Json<Row> = {
	[Field in keyof Row]: Row[Field] extends Date ? string : Row[Field] extends Date | null ? string | null : Row[Field]
}

type FoundFreezing = {
	lots: Json<FreezingFacts["lots"][number]>[]
	links: Json<FreezingFacts["links"][number]>[]
	loads: (Json<FreezingFacts["proven"][number]> & { proof: Json<AcceptedProof> })[]
	openLoads: number[]
}

/** The lot and all lots it came from, with their loads and proofs, in one query. Proofs come the latest first. */
async function findFreezing(tx: Tx, { producerId, lotId }: LotQuery) {
	const {
		rows: [found],
	} = await tx.execute<FoundFreezing>(sql`
		with recursive family as (
			select ${lotId}::uuid as lot_id
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
					order by p.lot_id = ${lotId} desc, p.created_at desc), '[]') from proven p) as loads,
			(select coalesce(json_agg(d.number order by d.number desc), '[]')
				from freezer_load_lots m join freezer_loads d on d.producer_id = m.producer_id and d.id = m.load_id
				where m.producer_id = ${producerId} and m.lot_id = ${lotId} and d.proven_at is null) as "openLoads"`)
	if (!found) throw new Error("a query of one row gave none")
	const facts: FreezingFacts = {
		lots: found.lots.map((lot) => ({ ...lot, releasedAt: lot.releasedAt === null ? null : new Date(lot.releasedAt) })),
		links: found.links.map((link) => ({ ...link, at: new Date(link.at) })),
		proven: found.loads.map(({ proof: _, ...load }) => ({ ...load, provenBy: new Date(load.provenBy) })),
	}
	const proofs = found.loads.map(({ proof }) => ({ ...proof, enteredAt: new Date(proof.enteredAt) }))
	return { facts, proofs, openLoads: found.openLoads }
}

type FoundLotFacts = {
	piecesOnShelves: number
	check: ReleaseState["check"]
	release: Json<NonNullable<ReleaseState["release"]>> | null
}

async function findLotFacts(tx: Tx, { producerId, lotId }: LotQuery) {
	const {
		rows: [found],
	} = await tx.execute<FoundLotFacts>(sql`
		select
			(select coalesce(sum(b.pieces), 0)::int from stock_balances b
				where b.producer_id = ${producerId} and b.lot_id = ${lotId} and b.place in ('cold-room', 'ready')
			) as "piecesOnShelves",
			(select json_build_object('id', c.id, 'checkedOn', c.checked_on, 'hasPassed', c.has_passed) from net_checks c
				where c.producer_id = ${producerId} and c.lot_id = ${lotId}
				order by c.created_at desc, c.id desc limit 1) as check,
			(select json_build_object('kind', r.kind, 'reason', r.reason, 'who', u.name, 'releasedAt', r.released_at)
				from lot_releases r left join users u on u.id = r.released_by
				where r.producer_id = ${producerId} and r.lot_id = ${lotId}) as release`)
	if (!found) throw new Error("a query of one row gave none")
	const { release } = found
	return { ...found, release: release && { ...release, releasedAt: new Date(release.releasedAt) } }
}
