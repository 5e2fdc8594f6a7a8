import type { AssignableLot, AssignableOrder } from "~/domain/promise/assign-lots"

/** The most pieces that any assignment can serve: every choice of a lot for every single piece is tried. */
export function mostServed(lots: readonly AssignableLot[], orders: readonly AssignableOrder[]): number {
	const wanted = orders.flatMap((order) => Array.from({ length: order.pieces }, () => order.on))
	const seen = new Map<string, number>()
	const from = (index: number, left: readonly number[]): number => {
		const on = wanted[index]
		if (on === undefined) return 0
		const key = `${index}:${left.join()}`
		const known = seen.get(key)
		if (known !== undefined) return known
		let best = from(index + 1, left)
		for (const [at, { availableFrom, bestBefore }] of lots.entries()) {
			if ((left[at] ?? 0) === 0 || availableFrom > on || bestBefore < on) continue
			best = Math.max(best, 1 + from(index + 1, left.with(at, (left[at] ?? 0) - 1)))
		}
		seen.set(key, best)
		return best
	}
	return from(
		0,
		lots.map((one) => one.pieces),
	)
}
