import { shareWords } from "./breakage-words"

export type BrokenRow = { key: string; of: string; sentPieces: number; brokenPieces: number }

const ROW = 26
const LABEL = 128
const BAR = 420
const END = 150
const MOST_BARS = 20

/** Names longer than this are cut: the table below has them whole. */
const LABEL_LETTERS = 17

/**
 * Broken pieces as bars, the most first, twenty at most; the figure and the share of what was sent stand behind each. The
 * table below has the same figures and the others.
 */
export function WherePicture({ rows, by }: { rows: readonly BrokenRow[]; by: string }) {
	const shown = rows.filter(({ brokenPieces }) => brokenPieces > 0).slice(0, MOST_BARS)
	if (shown.length === 0) return null
	const most = Math.max(...shown.map(({ brokenPieces }) => brokenPieces))
	const height = shown.length * ROW + 6
	const width = LABEL + BAR + END
	const label = `Broken pieces by ${by}: ${shown.map((row) => `${row.key} ${row.brokenPieces}`).join(", ")}`
	return (
		// biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard
		<section className="where-picture" aria-label={`Broken pieces by ${by}, drawn`} tabIndex={0}>
			<svg width={width} height={height} viewBox={`0 0 ${width} ${height}`} role="img" aria-label={label}>
				<path className="where-axis" d={`M${LABEL + 0.5} 0V${height}`} />
				{shown.map((row, index) => (
					<Bar key={row.key} row={row} y={index * ROW + 4} most={most} />
				))}
			</svg>
		</section>
	)
}

function Bar({ row, y, most }: { row: BrokenRow; y: number; most: number }) {
	const width = Math.max(2, Math.round((row.brokenPieces / most) * BAR))
	const name = row.key.length > LABEL_LETTERS ? `${row.key.slice(0, LABEL_LETTERS - 1)}…` : row.key
	return (
		<g>
			<text className="where-word" x={LABEL - 8} y={y + 14} textAnchor="end">
				{name}
			</text>
			<path className="where-bar" d={`M${LABEL + 0.5} ${y + 0.5}h${width}v17h-${width}z`} />
			<text className="where-word" x={LABEL + width + 8} y={y + 14}>
				{row.brokenPieces}, {shareWords(row.brokenPieces, row.sentPieces)} of those sent
			</text>
		</g>
	)
}
