import { type Day, monthDay, shortMonthDay } from "~/domain/calendar"
import type { ForecastWeek } from "~/domain/crop/hindsight"

const HEIGHT = 150
const FOOT = 22
const LEFT = 44
const STEP = 46

/**
 * Past weeks side by side: what was expected two weeks ahead as a span from low to high with a stroke at the likely figure,
 * and what came off as a solid bar beside it. In pieces; the table below has the same figures.
 */
export function ForecastPicture({ weeks, productName }: { weeks: readonly ForecastWeek[]; productName: string }) {
	const most = Math.max(1, ...weeks.map(({ twoAhead, cameOff }) => Math.max(twoAhead?.high ?? 0, cameOff)))
	const top = roundUp(most)
	const y = (pieces: number) => Math.round(HEIGHT - (pieces / top) * (HEIGHT - 10))
	const width = LEFT + weeks.length * STEP + 8
	return (
		// biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard
		<section className="overflow-x-auto px-4 desk:px-8" aria-label="Weeks drawn" tabIndex={0}>
			<svg
				width={width}
				height={HEIGHT + FOOT}
				viewBox={`0 0 ${width} ${HEIGHT + FOOT}`}
				role="img"
				aria-label={`${productName}: expected two weeks ahead, and what came off, in ${weeks.length} weeks from ${monthDay(weeks[0]?.weekOn ?? "")}`}
			>
				{[0, top / 2, top].map((pieces) => (
					<g key={pieces}>
						<path className="fc-rule" d={`M${LEFT - 6} ${y(pieces) + 0.5}H${width}`} />
						<text className="fc-word" x={LEFT - 10} y={y(pieces) + 4} textAnchor="end">
							{pieces}
						</text>
					</g>
				))}
				{weeks.map((week, index) => (
					<Week key={week.weekOn} week={week} x={LEFT + index * STEP} y={y} />
				))}
			</svg>
		</section>
	)
}

function Week({ week, x, y }: { week: ForecastWeek; x: number; y: (pieces: number) => number }) {
	const { twoAhead, cameOff, weekOn } = week
	return (
		<g>
			{twoAhead && (
				<>
					<path
						className="c-expected"
						d={`M${x + 4.5} ${y(twoAhead.high) + 0.5}h13v${Math.max(2, y(twoAhead.low) - y(twoAhead.high))}h-13z`}
					/>
					<path className="c-least" d={`M${x + 2} ${y(twoAhead.likely) + 0.5}h18`} />
				</>
			)}
			{cameOff > 0 && <path className="c-free" d={`M${x + 22} ${y(cameOff)}h13V${y(0)}h-13z`} />}
			<text className="fc-word" x={x + 20} y={HEIGHT + 16} textAnchor="middle">
				{shortMonthDay(weekOn as Day)}
			</text>
		</g>
	)
}

/** The next even, round number: 20, 50, 100, 200, 500 and so on. */
function roundUp(most: number): number {
	const power = 10 ** Math.floor(Math.log10(most))
	return [1, 2, 4, 6, 8, 10].map((times) => times * power).find((round) => round >= most && round >= 10) ?? 10
}
