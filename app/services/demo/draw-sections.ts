const ROW = 10

/** So many sections of one super, by how far they are. */
export type Sections = { capacity: number; full: number; capped: number }

/**
 * The sections of a super from above as the checks keep them, one digit each, row by row. Bees work from the middle
 * outward (common practice, no source): capped in the middle, then full, then filling, begun and bare.
 */
export function drawSections({ capacity, full, capped }: Sections): string {
	const filling = Math.min(capacity - full, Math.ceil(full / 3) + 2)
	const begun = Math.min(capacity - full - filling, 6)
	const outward = Array.from({ length: capacity }, (_, cell) => cell).toSorted(
		(a, b) => fromMiddle(a, capacity) - fromMiddle(b, capacity) || a - b,
	)
	const digits = Array.from({ length: capacity }, () => "0")
	for (const [rank, cell] of outward.entries()) {
		if (rank < capped) digits[cell] = "4"
		else if (rank < full) digits[cell] = "3"
		else if (rank < full + filling) digits[cell] = "2"
		else if (rank < full + filling + begun) digits[cell] = "1"
	}
	return digits.join("")
}

/** How far a section lies from the middle of its super; a little uneven, as comb is. */
function fromMiddle(cell: number, capacity: number): number {
	const rows = Math.ceil(capacity / ROW)
	const down = Math.floor(cell / ROW) - (rows - 1) / 2
	const across = (cell % ROW) - (ROW - 1) / 2
	return Math.hypot(down * 1.6, across) + ((cell * 7) % 5) / 6
}

/** The share of so many sections, in whole percent. */
export function percentOf({ capacity }: Pick<Sections, "capacity">, pieces: number): number {
	return Math.round((100 * pieces) / capacity)
}
