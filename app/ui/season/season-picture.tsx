import { type Day, monthDay, shortMonthDay } from "~/domain/calendar"

/** One week of a product in whole cases. */
export type ShownWeek = {
	weekOn: Day
	commitment: number
	standing: number
	single: number
	low: number
	likely: number
	high: number
	/** At the low figure, and at the likely one. */
	short: number
	shortLikely: number
}

const HEIGHT = 128
const TOP = 16
const FOOT = 20
const LEFT = 40
const STEP = 36
const BAR = 18

/**
 * A season of one product: what is promised as outlined bars, commitments at the foot, over what will be there: the low
 * figure as a line, from low to high as a faded band. A short week is hatched to what is wanted and named above. The table
 * below has the same figures.
 */
export function SeasonPicture({ name, weeks }: { name: string; weeks: readonly ShownWeek[] }) {
	const most = Math.max(4, ...weeks.map((week) => wantedOf(week)))
	// Supply far beyond what is wanted is cut off at the head: it is the short weeks that the picture is for.
	const top = roundUp(Math.max(most, Math.min(most * 2, ...[Math.max(...weeks.map(({ high }) => high))])))
	const y = (cases: number) => Math.round(TOP + HEIGHT - (Math.min(cases, top) / top) * HEIGHT) + 0.5
	const width = LEFT + weeks.length * STEP + 8
	const shortIn = weeks.filter(({ short }) => short > 0)
	const label = `${name}, ${weeks.length} weeks from ${monthDay(weeks[0]?.weekOn ?? "")}: ${
		shortIn.length === 0
			? "no week is short at the low figure"
			: `short in the ${shortIn.length === 1 ? "week" : "weeks"} of ${shortIn.map(({ weekOn, short }) => `${monthDay(weekOn)} by ${short}`).join(", ")}`
	}`
	return (
		// biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard
		<section className="season-picture" aria-label={`${name} drawn`} tabIndex={0}>
			<svg
				width={width}
				height={TOP + HEIGHT + FOOT}
				viewBox={`0 0 ${width} ${TOP + HEIGHT + FOOT}`}
				role="img"
				aria-label={label}
			>
				{[0, top / 2, top].map((cases) => (
					<g key={cases}>
						<path className="fc-rule" d={`M${LEFT - 6} ${y(cases)}H${width}`} />
						<text className="fc-word" x={LEFT - 10} y={y(cases) + 4} textAnchor="end">
							{cases}
						</text>
					</g>
				))}
				<path className="season-range" d={band(weeks, y)} />
				{weeks.map((week, index) => (
					<Week
						key={week.weekOn}
						week={week}
						x={LEFT + index * STEP + (STEP - BAR) / 2}
						y={y}
						isNamed={index % 2 === 0}
						isFirstShort={(weeks[index - 1]?.short ?? 0) === 0}
					/>
				))}
				<path className="season-low" d={line(weeks, y)} />
			</svg>
		</section>
	)
}

const wantedOf = ({ commitment, standing, single }: ShownWeek) => commitment + standing + single

type WeekProps = {
	week: ShownWeek
	x: number
	y: (cases: number) => number
	isNamed: boolean
	/** Of short weeks in a row the first says the word, so that the figures of the others have room. */
	isFirstShort: boolean
}

function Week({ week, x, y, isNamed, isFirstShort }: WeekProps) {
	const { commitment, standing, single, short, weekOn } = week
	const wanted = wantedOf(week)
	const parts = [
		{ key: "commitment", from: 0, to: commitment },
		{ key: "standing", from: commitment, to: commitment + standing },
		{ key: "single", from: commitment + standing, to: commitment + standing + single },
	]
	return (
		<g>
			{parts.map(({ key, from, to }) =>
				to > from ? (
					<path
						key={key}
						className={`season-bar ${key}`}
						d={`M${x + 0.5} ${y(from)}V${y(to)}h${BAR - 1}V${y(from)}z`}
					/>
				) : null,
			)}
			{short > 0 && (
				<>
					<path
						className="season-short"
						d={`M${x + 0.5} ${y(wanted - short)}V${y(wanted)}h${BAR - 1}V${y(wanted - short)}z`}
					/>
					<text className="season-short-word" x={x + BAR / 2} y={y(wanted) - 4} textAnchor="middle">
						{isFirstShort ? `${short} short` : short}
					</text>
				</>
			)}
			{isNamed && (
				<text className="fc-word" x={x + BAR / 2} y={TOP + HEIGHT + 15} textAnchor="middle">
					{shortMonthDay(weekOn)}
				</text>
			)}
		</g>
	)
}

/** The low figure as steps, week by week. */
function line(weeks: readonly ShownWeek[], y: (cases: number) => number): string {
	return weeks.map(({ low }, index) => `${index === 0 ? "M" : "L"}${LEFT + index * STEP} ${y(low)}h${STEP}`).join("")
}

/** The band from the low to the high figure. */
function band(weeks: readonly ShownWeek[], y: (cases: number) => number): string {
	const over = weeks.map(({ high }, index) => `${index === 0 ? "M" : "L"}${LEFT + index * STEP} ${y(high)}h${STEP}`)
	const back = weeks.map(({ low }, index) => `L${LEFT + (index + 1) * STEP} ${y(low)}h-${STEP}`).toReversed()
	return `${[...over, ...back].join("")}z`
}

/** The next even, round number: 4, 10, 20, 40, 60 and so on. */
function roundUp(most: number): number {
	const power = 10 ** Math.floor(Math.log10(most))
	return [1, 2, 4, 6, 8, 10].map((times) => times * power).find((round) => round >= most && round % 2 === 0) ?? most
}
