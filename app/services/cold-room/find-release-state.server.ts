import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { frozenPieces } from "~/domain/cold-room/frozen-pieces"
import { type AcceptedProof, type Json, readFreezing } from "./read-freezing.server"

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
	const { producerId, lotId } = query
	const { facts, proofs } = await readFreezing(tx, { producerId, lotIds: [lotId] })
	const { piecesOnShelves, openLoads, check, release } = await findLotFacts(tx, query)
	const piecesFrozen = frozenPieces(lotId, facts)
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

type FoundLotFacts = {
	piecesOnShelves: number
	openLoads: number[]
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
			(select coalesce(json_agg(d.number order by d.number desc), '[]')
				from freezer_load_lots m join freezer_loads d on d.producer_id = m.producer_id and d.id = m.load_id
				where m.producer_id = ${producerId} and m.lot_id = ${lotId} and d.proven_at is null) as "openLoads",
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
