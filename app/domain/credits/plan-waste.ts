/** Pieces of a lot that an order was sent; `sold` is how many of them the ledger still has as sold with that order. */
export type SentLot = { lineId: string; lotId: string; orderId: string; pieces: number; sold: number }

/** Pieces of a lot that go from sold to waste. */
export type WastedPieces = { lotId: string; orderId: string; pieces: number }

/**
 * From which lots the broken pieces of each order line are written off: those that filled the line, in the order they are
 * given in, never more than the ledger still has as sold. Two lines that share a lot share its pieces. `missing` is what the
 * ledger has no longer as sold; what was written off already is not written off twice. This product's own rule.
 */
export function planWaste(
	broken: readonly { lineId: string; pieces: number }[],
	lots: readonly SentLot[],
): { moves: WastedPieces[]; missing: number } {
	const sold = new Map(lots.map((lot) => [keyOf(lot), lot.sold]))
	const moves = new Map<string, WastedPieces>()
	let missing = 0
	for (const { lineId, pieces } of broken) {
		let left = pieces
		for (const lot of lots.filter((one) => one.lineId === lineId)) {
			const key = keyOf(lot)
			const here = sold.get(key) ?? 0
			const taken = Math.min(left, lot.pieces, here)
			if (taken === 0) continue
			sold.set(key, here - taken)
			left -= taken
			const { lotId, orderId } = lot
			moves.set(key, { lotId, orderId, pieces: (moves.get(key)?.pieces ?? 0) + taken })
		}
		missing += left
	}
	return { moves: [...moves.values()], missing }
}

const keyOf = ({ lotId, orderId }: Pick<SentLot, "lotId" | "orderId">) => `${lotId} ${orderId}`
