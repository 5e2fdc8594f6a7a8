import type { Origin, Place } from "./places"

/** The places that are counted: shelves, and the table of a market day. */
export const countedPlaces = ["cold-room", "ready", "market"] as const satisfies readonly Place[]
export type CountedPlace = (typeof countedPlaces)[number]

/** One lot at the place: what was counted, what the ledger has there, and what earlier counts did not find anywhere. */
export type CountedLot = { lotId: string; counted: number; ledger: number; missing: number }

/** A move that brings the ledger to the count. From null: pieces that were never written down. */
export type CountMove = { lotId: string; from: Origin; to: Place; pieces: number }

/**
 * The moves that bring the ledger to what was counted at one place, in the order of the lots. Fewer: the rest is missing.
 * More: first what is missing of the lot is found again; what is over was never written down, comes from no place and
 * raises what was harvested. Pieces as whole numbers, not negative; throws RangeError otherwise. This product's own rule.
 */
export function movesOfCount(place: CountedPlace, lots: readonly CountedLot[]): CountMove[] {
	return lots.flatMap(({ lotId, counted, ledger, missing }) => {
		for (const pieces of [counted, ledger, missing]) {
			if (!Number.isSafeInteger(pieces) || pieces < 0) throw new RangeError(`not whole pieces: ${pieces}`)
		}
		const moves: CountMove[] = []
		const more = Math.max(0, counted - ledger)
		const found = Math.min(more, missing)
		if (counted < ledger) moves.push({ lotId, from: place, to: "missing", pieces: ledger - counted })
		if (found > 0) moves.push({ lotId, from: "missing", to: place, pieces: found })
		if (more > found) moves.push({ lotId, from: null, to: place, pieces: more - found })
		return moves
	})
}
