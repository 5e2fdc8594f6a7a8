import type { Place } from "~/domain/stock/places"
import type { Stock } from "./ledger"

/** Lets so many pieces more of a lot have come off the hives and gone on to each of `places` in turn. */
export function growLot(stock: Stock, lotId: string, pieces: number, places: readonly Place[]): void {
	const lot = stock.lots.find(({ id }) => id === lotId)
	if (!lot) throw new Error("the demo has no such lot")
	lot.piecesHarvested += pieces
	let from: Place | null = null
	for (const to of places) {
		const move = stock.moves.find((one) => one.lotId === lotId && one.fromPlace === from && one.toPlace === to)
		if (!move) throw new Error(`lot ${lot.code} never went to ${to}`)
		move.pieces += pieces
		from = to
	}
}
