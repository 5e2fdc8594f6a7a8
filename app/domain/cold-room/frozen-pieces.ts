/** What is known of a lot and of the lots that it came from: all facts of its freezing. */
export type FreezingFacts = {
	lots: readonly { lotId: string; piecesHarvested: number; releasedAt: Date | null }[]
	/** Pieces that lay in a load whose treatment was proven; `provenBy` is when they had been cold for long enough. */
	proven: readonly { lotId: string; pieces: number; provenBy: Date }[]
	/** How pieces came from one lot into another; `piecesMade` came into `toLotId`. */
	links: readonly { fromLotId: string; toLotId: string; piecesMade: number; at: Date }[]
}

/**
 * How many pieces of a lot are known to have been frozen long enough: those that lay in its own proven loads, and those
 * that came from another lot after all of that one had been frozen or it had been released. Of a lot that was frozen in
 * part nobody knows which pieces went on, so what came from it counts as not frozen. The answer may exceed the pieces
 * of the lot, as a lot can be frozen twice.
 */
export function frozenPieces(lotId: string, facts: FreezingFacts, by: Date | null = null): number {
	const isBy = (at: Date) => by === null || at <= by
	const own = facts.proven.filter((load) => load.lotId === lotId && isBy(load.provenBy))
	const came = facts.links.filter((link) => link.toLotId === lotId && isBy(link.at) && isFrozenWhole(link, facts))
	return own.reduce((sum, load) => sum + load.pieces, 0) + came.reduce((sum, link) => sum + link.piecesMade, 0)
}

/** Whether all of the lot that a link leads from was frozen or released by then. Lots never lead back to themselves. */
function isFrozenWhole(link: FreezingFacts["links"][number], facts: FreezingFacts): boolean {
	const from = facts.lots.find((lot) => lot.lotId === link.fromLotId)
	if (!from) return false
	if (from.releasedAt !== null && from.releasedAt <= link.at) return true
	return frozenPieces(from.lotId, facts, link.at) >= from.piecesHarvested
}
