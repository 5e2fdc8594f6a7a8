import { lots, stockMoves } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { LotFacts } from "~/domain/lots/regroup"

/** A lot to be made; it begins held, with all its pieces in the cold room. */
export type NewLot = Omit<LotFacts, "state"> & {
	id: string
	code: string
	pieces: number
	harvestId: string | null
	/** Why its pieces are there: "off the hives", "split from lot 2126-004". */
	reason: string
}

/** Writes lots with their pieces in the cold room, all held. */
export async function writeLots(
	tx: Tx,
	query: { producerId: string; personId: string; lots: readonly NewLot[] },
): Promise<void> {
	const { producerId, personId } = query
	if (query.lots.length === 0) return
	await tx
		.insert(lots)
		.values(query.lots.map(({ pieces, reason: _, ...lot }) => ({ ...lot, producerId, piecesHarvested: pieces })))
	await tx.insert(stockMoves).values(
		query.lots.map(({ id, pieces, reason }) => ({
			producerId,
			lotId: id,
			fromPlace: null,
			toPlace: "cold-room" as const,
			pieces,
			reason,
			movedBy: personId,
		})),
	)
}
