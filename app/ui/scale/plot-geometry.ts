/** A line of the plot: where it stands and in which row its words are. */
export type PlotLine = {
	kind: "label" | "limit" | "variation"
	x: number
	row: number
	words: string
	anchor: "start" | "end"
}

export type PlotDot = { x: number; y: number; isTooShort: boolean }

export type PlotDrawing = {
	width: number
	height: number
	/** Where the dots stand on. */
	base: number
	average: number
	dots: PlotDot[]
	lines: PlotLine[]
	ends: { low: number; high: number }
}

export type PlotFacts = {
	errors: readonly { error: number; isTooShort: boolean }[]
	average: number
	limit: number | null
	variation: number
	words: { label: string; limit: string; variation: string }
}

const PAD = 16
const RADIUS = 5
const STEP = 2 * RADIUS + 1
const ROW = 19
const ROWS = 3
const FOOT = 44

/**
 * Places the errors of a check on a line, equal ones above one another, with the limits as lines: the label itself at zero,
 * the sample error limit and the maximum allowable variation below it. Coordinates in px.
 */
export function drawErrors(facts: PlotFacts, width: number): PlotDrawing {
	const all = facts.errors.map(({ error }) => error)
	const low = Math.min(-facts.variation, ...all) - 0.06 * facts.variation
	const high = Math.max(0.4 * facts.variation, ...all) + 0.06 * facts.variation
	const scale = (width - 2 * PAD) / (high - low)
	const at = (value: number) => Math.round((PAD + (value - low) * scale) * 10) / 10

	const levels: number[][] = []
	const placed = facts.errors
		.toSorted((a, b) => a.error - b.error)
		.map(({ error, isTooShort }) => {
			const x = at(error)
			const free = levels.findIndex((taken) => taken.every((other) => Math.abs(other - x) >= STEP))
			const level = free === -1 ? levels.length : free
			levels[level] = [...(levels[level] ?? []), x]
			return { x, level, isTooShort }
		})
	const base = ROWS * ROW + 14 + Math.max(4, levels.length) * STEP
	const line = (kind: PlotLine["kind"], value: number, row: number): PlotLine => {
		const x = at(value)
		return { kind, x, row, words: facts.words[kind], anchor: x > width / 2 ? "end" : "start" }
	}
	return {
		width,
		height: base + FOOT,
		base,
		average: at(facts.average),
		dots: placed.map(({ x, level, isTooShort }) => ({ x, y: base - RADIUS - 3 - level * STEP, isTooShort })),
		lines: [
			line("label", 0, 0),
			...(facts.limit === null ? [] : [line("limit", -facts.limit, 1)]),
			line("variation", -facts.variation, 2),
		],
		ends: { low: PAD / 2, high: width - PAD / 2 },
	}
}

/** The height in px of the words in a row above the dots. */
export const rowHeight = (row: number) => 13 + row * ROW
