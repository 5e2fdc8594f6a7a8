import type { ReactNode } from "react"
import { drawStrip, type StockState, type StripRun, type StripSize } from "./strip-geometry"

const WORDS: Record<StockState, string> = {
	free: "free to promise",
	held: "held",
	promised: "promised",
	expected: "expected",
	short: "short",
}
const NUMBER_WORDS: Record<number, string> = { 5: "five", 10: "ten" }

type FillStripProps = {
	runs: readonly StripRun[]
	size?: StripSize
	/** The words under the strip; with no stock at all they stand alone. */
	caption?: ReactNode
	/** Draws the least-acceptable stroke after so many cells, and counts fives over all runs. */
	least?: number
	/** What one store asked and gets: no gaps between the states. */
	countsThrough?: boolean
	/** The strip in words, for those who do not see it. Left out, the counts and states are read. */
	label?: string
	/** `waiting` is one ruled line; `not-counted` is words, never an empty strip. */
	status?: "ready" | "waiting" | "not-counted"
}

/** How much, in what state, countable at a glance. Made of SVG paths, so it prints and needs no script. */
export function FillStrip({
	runs,
	size = "md",
	caption,
	least,
	countsThrough,
	label,
	status = "ready",
}: FillStripProps) {
	if (status === "waiting") {
		return (
			<span className="fill-strip" aria-busy="true">
				<span className="strip-waiting" />
			</span>
		)
	}
	if (status === "not-counted") return <span className="fill-strip short font-semibold">not counted</span>
	const drawing = drawStrip(runs, size, { least, countsThrough })
	if (!drawing) return <span className="fill-strip note">{caption ?? "none left"}</span>
	const { width, height, unitsPerCell } = drawing
	const words = runs.filter((run) => run.count > 0).map((run) => `${run.count} ${WORDS[run.state]}`)
	return (
		<span className="fill-strip">
			<svg
				className="strip"
				width={width}
				height={height}
				viewBox={`0 0 ${width} ${height}`}
				role="img"
				aria-label={label ?? words.join(", ")}
			>
				{drawing.paths.map(({ state, d }) => (
					<path key={state} className={`c-${state}`} d={d} />
				))}
				{drawing.least && <path className={drawing.least.isUnder ? "c-least under" : "c-least"} d={drawing.least.d} />}
			</svg>
			{(caption || unitsPerCell > 1) && (
				<span className="strip-caption">
					{caption}
					{unitsPerCell > 1 && `${caption ? "; one" : "One"} cell is ${NUMBER_WORDS[unitsPerCell] ?? unitsPerCell}`}
				</span>
			)}
		</span>
	)
}
