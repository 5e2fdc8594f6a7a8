import { type SectionState, superGrid } from "~/domain/crop/super-drawing"
import { rectangle } from "./strip-geometry"

const CELL = 10
const STEP = 12
const PAD = 6
/** The box is drawn so wide, however many sections stand in it. */
const WIDTH = 130
const USUAL_SECTIONS = 40

/** How far each drawing of a section stands in from its cell's edge. */
const INSETS: Record<SectionState, number> = { bare: 0.5, begun: 3.5, filling: 2, full: 0, capped: 0 }
const CLASSES: [SectionState, string][] = [
	["begun", "s-growing"],
	["filling", "s-growing"],
	["full", "s-full"],
	["capped", "s-capped"],
]

/**
 * A super seen from above: four rows of ten sections in the usual box. `sections` is read row by row; an empty list is the
 * box alone. `isReady` marks it to be taken off, `isUnseen` that nobody has looked for 10 days; the words for either stand
 * below the drawing.
 */
export function SuperBlock({
	sections,
	isReady = false,
	isUnseen = false,
	label,
}: {
	sections: readonly SectionState[]
	isReady?: boolean
	isUnseen?: boolean
	label: string
}) {
	const { rows, across } = superGrid(sections.length || USUAL_SECTIONS)
	const width = PAD * 2 + across * STEP - (STEP - CELL)
	const height = PAD * 2 + rows * STEP - (STEP - CELL)
	const squares = (states: readonly SectionState[], inset?: number) =>
		sections
			.map((state, i) => {
				const by = inset ?? INSETS[state]
				const [x, y] = [PAD + (i % across) * STEP + by, PAD + Math.floor(i / across) * STEP + by]
				return states.includes(state) ? rectangle(x, y, CELL - 2 * by, CELL - 2 * by) : ""
			})
			.join("")
	const className = ["super", isReady && "is-ready", isUnseen && !isReady && "is-unseen"].filter(Boolean).join(" ")
	return (
		<svg
			className={className}
			width={WIDTH}
			height={Math.round((height * WIDTH) / width)}
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

/** One section alone, for a key. */
export function SectionSign({ state }: { state: SectionState }) {
	const square = (inset: number) => rectangle(1 + inset, 1 + inset, CELL - 2 * inset, CELL - 2 * inset)
	const className = CLASSES.find(([name]) => name === state)?.[1]
	return (
		<svg width={CELL + 2} height={CELL + 2} viewBox={`0 0 ${CELL + 2} ${CELL + 2}`} aria-hidden="true">
			{state !== "full" && state !== "capped" && <path className="s-bare" d={square(INSETS.bare)} />}
			{className && <path className={className} d={square(INSETS[state])} />}
			{state === "capped" && <path className="s-lid" d={square(2.5)} />}
		</svg>
	)
}
