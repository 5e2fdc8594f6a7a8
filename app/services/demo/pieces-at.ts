import type { Place } from "~/domain/stock/places"
import type { Stock } from "./ledger"

/** The pieces of each lot at a place (all references together) at a moment; lots that never were there are left out. */
export function piecesAt(moves: Stock["moves"], place: Place, at: Date): Map<string, number> {
	const pieces = new Map<string, number>()
	for (const move of moves) {
		if (move.movedAt > at) continue
		const change = (move.toPlace === place ? move.pieces : 0) - (move.fromPlace === place ? move.pieces : 0)
		if (change !== 0) pieces.set(move.lotId, (pieces.get(move.lotId) ?? 0) + change)
	}
	return pieces
}
