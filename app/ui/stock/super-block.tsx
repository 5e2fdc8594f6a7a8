import { rectangle } from "./strip-geometry"

/** One section of a super: bare comb foundation to fully capped. */
export type SectionState = "bare" | "begun" | "filling" | "full" | "capped"

const CELL = 10
const STEP = 12
const PAD = 6
const ACROSS = 10

/** How far each drawing of a section stands in from its cell's edge. */
const INSETS: Record<SectionState, number> = { bare: 0.5, begun: 3.5, filling: 2, full: 0, capped: 0 }
const CLASSES: [SectionState, string][] = [
	["begun", "s-growing"],
	["filling", "s-growing"],
	["full", "s-full"],
	["capped", "s-capped"],
]

/**
 * A super seen from above, four rows of ten sections. `sections` is read row by row; an empty list is one that nobody has
 * looked at for 10 days. `isReady` marks it to be taken off; the words for that stand below the drawing.
 */
export function SuperBlock({
	sections,
	isReady = false,
	label,
}: {
	sections: readonly SectionState[]
	isReady?: boolean
	label: string
}) {
	const width = PAD * 2 + ACROSS * STEP - (STEP - CELL)
	const height = PAD * 2 + 4 * STEP - (STEP - CELL)
	const squares = (states: readonly SectionState[], inset?: number) =>
		sections
			.map((state, i) => {
				const by = inset ?? INSETS[state]
				const [x, y] = [PAD + (i % ACROSS) * STEP + by, PAD + Math.floor(i / ACROSS) * STEP + by]
				return states.includes(state) ? rectangle(x, y, CELL - 2 * by, CELL - 2 * by) : ""
			})
			.join("")
	const className = isReady ? "super is-ready" : sections.length === 0 ? "super is-unseen" : "super"
	return (
		<svg
			className={className}
			width={width}
			height={height}
			viewBox={`0 0 ${width} ${height}`}
			role="img"
			aria-label={label}
		>
			<path className="s-box" d={rectangle(0.5, 0.5, width - 1, height - 1)} />
			<path className="s-in" d={rectangle(PAD - 2, PAD - 2, width - 2 * PAD + 4, height - 2 * PAD + 4)} />
			<path className="s-bare" d={squares(["bare", "begun", "filling"], INSETS.bare)} />
			{CLASSES.map(([state, name]) => (
				<path key={state} className={name} d={squares([state])} />
			))}
			<path className="s-lid" d={squares(["capped"], 2.5)} />
		</svg>
	)
}
