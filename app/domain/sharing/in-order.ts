/**
 * The place of each value among the values that differ, 0 for the smallest, and how many differ. Numbers are sorted as
 * such, without a function being asked for each pair, which is what costs when ten thousand are put in order.
 */
export function ranksOf(values: Float64Array): { ranks: Uint32Array; distinct: number } {
	const sorted = values.toSorted()
	let distinct = 0
	for (let index = 0; index < sorted.length; index += 1) {
		const value = sorted[index] as number
		if (distinct > 0 && value === sorted[distinct - 1]) continue
		sorted[distinct] = value
		distinct += 1
	}
	const ranks = new Uint32Array(values.length)
	for (let index = 0; index < values.length; index += 1) {
		ranks[index] = placeIn(sorted, distinct, values[index] as number)
	}
	return { ranks, distinct }
}

function placeIn(sorted: Float64Array, length: number, value: number): number {
	let [from, to] = [0, length - 1]
	while (from < to) {
		const middle = (from + to) >>> 1
		if ((sorted[middle] as number) < value) from = middle + 1
		else to = middle
	}
	return from
}

/** The indices in the order of their values, the earlier index first where two are equal. */
export function inOrder(values: Float64Array): Uint32Array {
	const { ranks, distinct } = ranksOf(values)
	const next = new Uint32Array(distinct + 1)
	for (let index = 0; index < ranks.length; index += 1) {
		const after = (ranks[index] as number) + 1
		next[after] = (next[after] as number) + 1
	}
	for (let rank = 1; rank <= distinct; rank += 1) next[rank] = (next[rank] as number) + (next[rank - 1] as number)
	const order = new Uint32Array(values.length)
	for (let index = 0; index < ranks.length; index += 1) {
		const rank = ranks[index] as number
		order[next[rank] as number] = index
		next[rank] = (next[rank] as number) + 1
	}
	return order
}
