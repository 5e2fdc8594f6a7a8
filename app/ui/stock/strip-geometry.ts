/** How a case (or piece) stands: free to promise, held, promised, expected from the hives, or asked for and not there. */
export type StockState = "free" | "held" | "promised" | "expected" | "short"
export type StripRun = { state: StockState; count: number }
export type StripSize = "sm" | "md" | "lg"
type StripDrawing = {
	width: number
	height: number
	/** Cases (or pieces) that one cell stands for: 1 up to 120, then the next round number that keeps it under 120 cells. */
	unitsPerCell: number
	/** One path per state that occurs, in the fixed order free, held, promised, expected, short. */
	paths: { state: StockState; d: string }[]
	/** The least-acceptable stroke; `isUnder` when what is given falls below it. */
	least: { d: string; isUnder: boolean } | null
}

type CellShape = { w: number; h: number; gap: number; five: number; run: number; hatch: number; line: number }

/** Pixels: one cell, gap between cells, after each fifth, between states, distance of the hatch, gap between lines. */
const SHAPES: Record<StripSize, CellShape> = {
	sm: { w: 5, h: 12, gap: 2, five: 4, run: 7, hatch: 4, line: 4 },
	md: { w: 7, h: 17, gap: 2, five: 5, run: 9, hatch: 4.5, line: 5 },
	lg: { w: 10, h: 24, gap: 3, five: 7, run: 12, hatch: 5.5, line: 7 },
}
const STATES: readonly StockState[] = ["free", "held", "promised", "expected", "short"]
const LONGEST_LINE = 40
const CELLS_A_BROKEN_LINE = 20
const MOST_CELLS = 120
const UNITS_PER_CELL = [1, 5, 10, 50, 100, 500, 1000, 5000, 10_000]

const tenth = (n: number) => Math.round(n * 10) / 10
export const rectangle = (x: number, y: number, w: number, h: number) =>
	`M${tenth(x)} ${tenth(y)}h${tenth(w)}v${tenth(h)}h${tenth(-w)}z`

function hatched(x: number, y: number, w: number, h: number, step: number): string {
	let d = rectangle(x, y, w, h)
	for (let t = step; t < w + h; t += step) {
		const [ax, ay] = t <= h ? [0, t] : [t - h, h]
		const [bx, by] = t <= w ? [t, 0] : [w, t - w]
		d += `M${tenth(x + ax)} ${tenth(y + ay)}L${tenth(x + bx)} ${tenth(y + by)}`
	}
	return d
}

function cell(state: StockState, x: number, y: number, z: CellShape): string {
	const low = Math.round(z.h * 0.42)
	switch (state) {
		case "free":
			return rectangle(x, y, z.w, z.h)
		case "held":
			return hatched(x + 0.5, y + 0.5, z.w - 1, z.h - 1, z.hatch)
		case "promised":
			return rectangle(x + 0.75, y + 0.75, z.w - 1.5, z.h - 1.5)
		case "expected":
			return rectangle(x + 0.5, y + z.h - low - 0.5, z.w - 1, low)
		case "short":
			return `M${x} ${y + z.h - 1}h${z.w}`
	}
}

const sumOf = (runs: readonly StripRun[]) => runs.reduce((sum, run) => sum + run.count, 0)

/** What one cell stands for, so that `total` takes at most 120 cells: 1, 5, 10, 50 and so on. */
export function unitsPerCell(total: number): number {
	return UNITS_PER_CELL.find((units) => total / units <= MOST_CELLS) ?? Math.ceil(total / MOST_CELLS)
}

type PlacedCell = { state: StockState; x: number; y: number }

/** Sets cells from left to right: a wider gap after each fifth and between runs, a new line after `breakAt` cells. */
function placeCells(
	runs: readonly StripRun[],
	z: CellShape,
	{ breakAt, countsThrough, lineHeight }: { breakAt: number; countsThrough: boolean; lineHeight: number },
): PlacedCell[] {
	const placed: PlacedCell[] = []
	let [x, y, onLine, sinceGap] = [0, 0, 0, 0]
	for (const [index, { state, count }] of runs.entries()) {
		if (index > 0 && !countsThrough) {
			x += z.run - z.gap
			sinceGap = 0
		}
		for (let k = 0; k < count; k++) {
			if (onLine === breakAt) {
				x = 0
				y += lineHeight + z.line
				onLine = 0
				sinceGap = 0
			}
			if (sinceGap > 0 && sinceGap % 5 === 0) x += z.five - z.gap
			placed.push({ state, x, y })
			x += z.w + z.gap
			onLine++
			sinceGap++
		}
	}
	return placed
}

/**
 * Draws stock as countable cells. Runs keep their order; a run of nothing is left out.
 * `countsThrough` counts fives over all runs and sets no gap between them: what one store asked and gets. A `least` above
 * 0 implies it and draws the least-acceptable stroke after that many cells. Over 40 cells the line breaks at 20.
 * Counts are whole and not negative; lengths are in pixels. Returns null when there is nothing to draw.
 */
export function drawStrip(
	allRuns: readonly StripRun[],
	size: StripSize,
	{ least = 0, countsThrough = least > 0 }: { least?: number; countsThrough?: boolean } = {},
): StripDrawing | null {
	const runs = allRuns.filter((run) => run.count > 0)
	if (runs.length === 0) return null
	const z = SHAPES[size]
	const units = unitsPerCell(sumOf(runs))
	const cells = runs.map(({ state, count }) => ({ state, count: Math.max(1, Math.round(count / units)) }))
	const top = least > 0 ? 5 : 0
	const lineHeight = z.h + 2 * top
	const breakAt = sumOf(cells) > LONGEST_LINE ? CELLS_A_BROKEN_LINE : Number.POSITIVE_INFINITY
	const placed = placeCells(cells, z, { breakAt, countsThrough, lineHeight })

	const lastWithinLeast = placed[Math.ceil(least / units) - 1]
	const given = sumOf(runs.filter((run) => run.state !== "short"))
	return {
		width: Math.max(...placed.map(({ x }) => x + z.w)),
		height: Math.max(...placed.map(({ y }) => y)) + lineHeight,
		unitsPerCell: units,
		paths: STATES.flatMap((state) => {
			const d = placed.flatMap((p) => (p.state === state ? cell(state, p.x, p.y + top, z) : [])).join("")
			return d ? [{ state, d }] : []
		}),
		least: lastWithinLeast
			? {
					d: `M${lastWithinLeast.x + z.w + z.gap / 2} ${lastWithinLeast.y}v${lineHeight}m-3 0h6`,
					isUnder: given < least,
				}
			: null,
	}
}
