import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"

/** A lot of one product: usable for deliveries from `availableFrom` to `bestBefore`, both days included. */
export type AssignableLot = { lotId: string; availableFrom: Day; bestBefore: Day; pieces: number }

/** What one order needs of that product on its delivery day. */
export type AssignableOrder = { orderId: string; on: Day; pieces: number }

/** So many pieces of one lot for one order. */
export type LotPick = { orderId: string; lotId: string; pieces: number }

const text = (a: string, b: string) => (a < b ? -1 : a > b ? 1 : 0)

/**
 * Says which lot serves which order. Orders are taken by delivery day, the earlier in the list first on the same day, and
 * each takes from the lots that can serve its day the one with the earliest best-before first (then the earlier
 * available, then the lesser id). This order makes it feasible whenever any assignment is: a lot passed over keeps longer
 * than the one taken, so it can serve every later day that the other could.
 * When it is not feasible, answers `lots-too-few` with the pieces missing of each order, their sum as small as any
 * assignment allows, and the picks that can be made. Picks come by order and then best-before, in whole pieces.
 * Throws RangeError on negative or fractional pieces.
 */
export function assignLots(input: {
	lots: readonly AssignableLot[]
	orders: readonly AssignableOrder[]
}): Result<
	{ picks: LotPick[] },
	{ ok: false; reason: "lots-too-few"; picks: LotPick[]; missing: { orderId: string; pieces: number }[] }
> {
	for (const { pieces } of [...input.lots, ...input.orders]) {
		if (!Number.isSafeInteger(pieces) || pieces < 0) throw new RangeError(`not whole pieces: ${pieces}`)
	}
	const lots = input.lots
		.map((lot) => ({ ...lot, left: lot.pieces }))
		.toSorted(
			(a, b) => text(a.bestBefore, b.bestBefore) || text(a.availableFrom, b.availableFrom) || text(a.lotId, b.lotId),
		)
	const picks: LotPick[] = []
	const missing: { orderId: string; pieces: number }[] = []

	for (const order of input.orders.toSorted((a, b) => text(a.on, b.on))) {
		let needed = order.pieces
		for (const lot of lots) {
			if (needed === 0) break
			if (lot.left === 0 || lot.availableFrom > order.on || lot.bestBefore < order.on) continue
			const pieces = Math.min(needed, lot.left)
			lot.left -= pieces
			needed -= pieces
			picks.push({ orderId: order.orderId, lotId: lot.lotId, pieces })
		}
		if (needed > 0) missing.push({ orderId: order.orderId, pieces: needed })
	}
	return missing.length === 0 ? { ok: true, picks } : { ok: false, reason: "lots-too-few", picks, missing }
}
