import { drawErrors, type PlotFacts, rowHeight } from "./plot-geometry"

/** The errors of the sample as dots on a line, with the limits drawn and named. Drawn on the server; prints as it is. */
export function ErrorPlot({ facts, label }: { facts: PlotFacts; label: string }) {
	return (
		<figure className="error-plot">
			<Drawing facts={facts} label={label} width={720} className="max-desk:hidden print:block!" />
			<Drawing facts={facts} label={label} width={340} className="desk:hidden print:hidden" />
			<figcaption className="note">{label}</figcaption>
		</figure>
	)
}

function Drawing(props: { facts: PlotFacts; label: string; width: number; className: string }) {
	const { width, height, base, average, dots, lines, ends } = drawErrors(props.facts, props.width)
	return (
		<svg
			className={props.className}
			width={width}
			height={height}
			viewBox={`0 0 ${width} ${height}`}
			role="img"
			aria-label={props.label}
		>
			<path className="plot-base" d={`M${ends.low} ${base}H${ends.high}`} />
			{lines.map(({ kind, x, row, words, anchor }) => (
				<g key={kind} className={`plot-${kind}`}>
					<path d={`M${x} ${rowHeight(row) - 11}V${base + 6}`} />
					<text x={x + (anchor === "end" ? -5 : 5)} y={rowHeight(row)} textAnchor={anchor}>
						{words}
					</text>
				</g>
			))}
			{dots.map(({ x, y, isTooShort }, place) =>
				isTooShort ? (
					// biome-ignore lint/suspicious/noArrayIndexKey: the dots are drawn once, and several may lie on one place
					<path key={place} className="dot-short" d={`M${x - 5} ${y - 5}l10 10m0 -10l-10 10`} />
				) : (
					// biome-ignore lint/suspicious/noArrayIndexKey: the dots are drawn once, and several may lie on one place
					<circle key={place} className="dot" cx={x} cy={y} r={4.5} />
				),
			)}
			<path className="plot-average" d={`M${average} ${base + 3}l6 10h-12z`} />
			<text
				className="plot-average-words"
				x={Math.min(Math.max(average, 34), width - 34)}
				y={base + 30}
				textAnchor="middle"
			>
				average
			</text>
		</svg>
	)
}
