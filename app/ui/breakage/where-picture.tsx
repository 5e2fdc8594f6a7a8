import { shareWords } from "./breakage-words"

export type BrokenRow = { key: string; of: string; sentPieces: number; brokenPieces: number }

const ROW = 44
const BAR = 480
const MOST_BARS = 20

/** Names longer than this are cut: the table below has them whole. */
const NAME_LETTERS = 34

/**
 * Broken pieces as bars, the most first, twenty at most; the name, the figure and the share of what was sent stand above
 * each. The table below has the same figures and the others.
 */
export function WherePicture({ rows, by }: { rows: readonly BrokenRow[]; by: string }) {
	const shown = rows.filter(({ brokenPieces }) => brokenPieces > 0).slice(0, MOST_BARS)
	if (shown.length === 0) return null
	const most = Math.max(...shown.map(({ brokenPieces }) => brokenPieces))
	const height = shown.length * ROW + 6
	const label = `Broken pieces by ${by}: ${shown.map((row) => `${row.key} ${row.brokenPieces}`).join(", ")}`
	return (
		// biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard
		<section className="where-picture" aria-label={`Broken pieces by ${by}, drawn`} tabIndex={0}>
			<svg width={BAR + 2} height={height} viewBox={`0 0 ${BAR + 2} ${height}`} role="img" aria-label={label}>
				<path className="where-axis" d={`M0.5 0V${height}`} />
				{shown.map((row, index) => (
					<Bar key={`${row.key} ${row.of}`} row={row} y={index * ROW} most={most} />
				))}
			</svg>
		</section>
	)
}

function Bar({ row, y, most }: { row: BrokenRow; y: number; most: number }) {
	const width = Math.max(2, Math.round((row.brokenPieces / most) * BAR))
	const whole = row.of ? `${row.key} ${row.of}` : row.key
	const name = whole.length > NAME_LETTERS ? `${whole.slice(0, NAME_LETTERS - 1)}…` : whole
	return (
		<g>
			<text className="where-word" x={8} y={y + 14}>
				{name}: {row.brokenPieces}, {shareWords(row.brokenPieces, row.sentPieces)}
			</text>
			<path className="where-bar" d={`M0.5 ${y + 20.5}h${width}v15h-${width}z`} />
		</g>
	)
}
