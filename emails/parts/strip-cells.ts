/** One cell of a strip: a case given, or a bare line for one that was asked for and not given. */
export type StripCell = "given" | "short"

export interface StripLayout {
	/** Cells in rows, ready to draw from the left; a wider gap follows each fifth cell of a row. */
	rows: StripCell[][]
	/** Width and height of one cell, the gap after it and the gap after a fifth, in pixels. */
	size: { width: number; height: number; gap: number; fifthGap: number }
	/** How many cases one cell stands for: 1, or 5 when there are very many. */
	casesPerCell: 1 | 5
	/** What the strip shows, in words, for those who do not see it. */
	label: string
}

const medium = { width: 7, height: 17, gap: 2, fifthGap: 5 }
const small = { width: 5, height: 12, gap: 2, fifthGap: 4 }

/**
 * Lays out the strip of one line: `given` of `asked` cases, one cell to a case, what is short at the end. The column
 * of a letter is narrow, so rows break after ten cells; over 40 cells are drawn small in rows of twenty; over 120
 * one cell is five cases (a begun five counts as one cell). Throws nothing; nothing asked gives no rows.
 */
export function stripCells(given: number, asked: number): StripLayout {
	const short = Math.max(0, asked - given)
	const total = given + short
	const casesPerCell = total > 120 ? 5 : 1
	const cells: StripCell[] = [
		...Array<StripCell>(Math.ceil(given / casesPerCell)).fill("given"),
		...Array<StripCell>(Math.ceil(short / casesPerCell)).fill("short"),
	]
	const perRow = total > 40 ? 20 : 10
	const rows: StripCell[][] = []
	for (let start = 0; start < cells.length; start += perRow) rows.push(cells.slice(start, start + perRow))
	return {
		rows,
		size: total > 40 ? small : medium,
		casesPerCell,
		label: short > 0 ? `${given} of ${asked} cases` : `${given} ${given === 1 ? "case" : "cases"}`,
	}
}

/** The gap after the cell at `index` of a row of `length` cells; none after the last. */
export function gapAfter(index: number, length: number, size: StripLayout["size"]): number {
	if (index === length - 1) return 0
	return (index + 1) % 5 === 0 ? size.fifthGap : size.gap
}

/** The words under a strip: "3", "2 of 4 asked"; where one cell is five cases they say so. */
export function stripCaption(given: number, asked: number): string {
	const { casesPerCell } = stripCells(given, asked)
	const words = given < asked ? `${given} of ${asked} asked` : `${given}`
	return casesPerCell === 1 ? words : `${words}; one cell is ${casesPerCell} cases`
}
