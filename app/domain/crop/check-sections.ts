const ROWS = 4
const FEWEST = 12
const MOST = 48

/**
 * How the sections of a super lie, seen from above: four rows of as many as its capacity gives, which is ten for the usual
 * forty. Null where they lie in no four even rows (under 12, over 48, or odd ones over); such a super is checked by shares
 * alone. Common practice, no source.
 */
export function layoutOf(capacityPieces: number): { rows: number; across: number } | null {
	const across = capacityPieces / ROWS
	if (!Number.isInteger(across) || capacityPieces < FEWEST || capacityPieces > MOST) return null
	return { rows: ROWS, across }
}

/** How many taps fill a row from the middle: each lays one section on either side; in an odd row the first lays one. */
export function tapsOfRow(across: number): number {
	return Math.ceil(across / 2)
}

/**
 * A row of codes from what was tapped, the middle first: bees fill from the middle, so "44321" is a row of ten with four
 * capped, two full, two filling and two begun, from the middle out. What was not tapped is bare. Throws RangeError for
 * other than codes and for more taps than fill the row.
 */
export function rowFromMiddle(taps: string, across: number): string {
	if (!/^[0-4]*$/.test(taps) || taps.length > tapsOfRow(across)) throw new RangeError(`no row of ${across}: ${taps}`)
	const row = Array.from({ length: across }, () => "0")
	const [left, right] = [Math.ceil(across / 2) - 1, Math.floor(across / 2)]
	for (const [step, code] of [...taps].entries()) {
		row[left - step] = code
		row[right + step] = code
	}
	return row.join("")
}

/** The shares of all sections in whole percent, each rounded once, half up. */
export type SectionShares = { filledPercent: number; cappedPercent: number }

/**
 * The filled and the capped share of a super from its sections' codes. A full and a capped section count as filled, one
 * that is filling counts half (common practice, no source). Capped is never more than filled. Throws RangeError for none.
 */
export function sharesOfSections(sections: string): SectionShares {
	if (!/^[0-4]+$/.test(sections)) throw new RangeError(`no sections: ${sections}`)
	const count = (code: string) => sections.split(code).length - 1
	const percent = (of: number) => Math.round((of * 100) / sections.length)
	const capped = count("4")
	return { filledPercent: percent(capped + count("3") + count("2") / 2), cappedPercent: percent(capped) }
}
