import type { CurveBucket } from "~/domain/cold-room/curve"
import { degrees, FREEZE_TABLE, type FreezeRow } from "~/domain/cold-room/freezing"

const WIDTH = 720
const HEIGHT = 330
const LEFT = 62
const BOTTOM = 32

type FreezeCurveProps = {
	buckets: readonly CurveBucket[]
	/** The run that decided, or came nearest. */
	run: { from: number; to: number } | null
	row: FreezeRow | null
	/** The first and last time in words. */
	ends: [string, string]
	/** All that the drawing shows, in words. */
	label: string
}

/**
 * What a logger showed: from lowest to highest in each stretch of time, the rows of the freezing table as lines, and the
 * run that decided as a washed band with its row drawn strong.
 */
export function FreezeCurve({ buckets, run, row, ends, label }: FreezeCurveProps) {
	const first = buckets[0]?.[0] ?? 0
	const last = Math.max(first + 1, buckets.at(-1)?.[0] ?? 1)
	const low = Math.min(-200, ...buckets.map(([, lowest]) => lowest))
	const high = Math.max(50, ...buckets.map(([, , highest]) => highest))
	const x = (at: number) => LEFT + ((Math.min(last, Math.max(first, at)) - first) / (last - first)) * (WIDTH - LEFT - 4)
	const y = (tenths: number) => 6 + ((high - tenths) / (high - low)) * (HEIGHT - BOTTOM - 6)
	const top = buckets.map(([at, , highest]) => `${x(at).toFixed(1)} ${y(highest).toFixed(1)}`)
	const under = buckets.map(([at, lowest]) => `${x(at).toFixed(1)} ${(y(lowest) + 1).toFixed(1)}`).toReversed()
	return (
		<svg className="freeze-curve" viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="img" aria-label={label}>
			{run && (
				<rect
					className="run"
					x={x(run.from)}
					y={6}
					width={Math.max(2, x(run.to) - x(run.from))}
					height={HEIGHT - BOTTOM - 6}
				/>
			)}
			<line className="axis" x1={LEFT} x2={WIDTH} y1={y(0)} y2={y(0)} />
			<text x={LEFT - 6} y={y(0) + 5} textAnchor="end">
				0 °C
			</text>
			{FREEZE_TABLE.map((one) => (
				<g key={one.tenthsC} className={one === row ? "row on" : "row"}>
					<line x1={LEFT} x2={WIDTH} y1={y(one.tenthsC)} y2={y(one.tenthsC)} />
					<text x={LEFT - 6} y={y(one.tenthsC) + 5} textAnchor="end">
						{degrees(one.tenthsC / 10)}
					</text>
				</g>
			))}
			<path className="curve" d={`M${[...top, ...under].join("L")}Z`} />
			<text x={LEFT} y={HEIGHT - 6}>
				{ends[0]}
			</text>
			<text x={WIDTH} y={HEIGHT - 6} textAnchor="end">
				{ends[1]}
			</text>
		</svg>
	)
}
