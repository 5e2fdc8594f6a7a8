import type { MoneyWeek } from "~/domain/books/dated-event"
import { type Day, monthDay, shortMonthDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { FillKey } from "~/ui/figures/fill-key"

const LEFT = 16
const STEP = 76
const BAR = 30
const WORD = 18
const UP = 120
/** So that one bar beside many is still seen. */
const LEAST = 2

/** Whole dollars, for a label over a bar. */
const dollars = (cents: number) => formatMoney(Math.round(cents / 100) * 100).replace(".00", "")

/**
 * Money by week: what came in stands on the line, solid; what went out hangs below it, outlined. Each bar says its amount.
 * The table below has the same figures.
 */
export function MoneyPicture({ weeks }: { weeks: readonly MoneyWeek[] }) {
	const most = Math.max(1, ...weeks.flatMap(({ inCents, outCents }) => [inCents, outCents]))
	const tall = (cents: number) => (cents === 0 ? 0 : Math.max(LEAST, Math.round((cents / most) * UP)))
	const down = Math.max(0, ...weeks.map(({ outCents }) => tall(outCents)))
	const line = WORD + UP
	const height = line + down + WORD + 24
	const width = LEFT * 2 + weeks.length * STEP
	const all = (key: "inCents" | "outCents") => weeks.reduce((sum, week) => sum + week[key], 0)
	return (
		<>
			<FillKey
				fills={[
					["money-in", `came in, ${formatMoney(all("inCents"))}`],
					["money-out", `went out, ${formatMoney(all("outCents"))}`],
				]}
			/>
			{/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls sideways is reached by keyboard */}
			<section className="books-picture" aria-label="Money by week, drawn" tabIndex={0}>
				<svg
					width={width}
					height={height}
					viewBox={`0 0 ${width} ${height}`}
					role="img"
					aria-label={`Money by week: ${weeks.map(weekWords).join("; ")}`}
				>
					{weeks.map(({ weekOn, inCents, outCents }, index) => (
						<Week
							key={weekOn}
							x={LEFT + index * STEP + (STEP - BAR) / 2}
							line={line}
							foot={height - 8}
							weekOn={weekOn}
							into={{ cents: inCents, tall: tall(inCents) }}
							out={{ cents: outCents, tall: tall(outCents) }}
						/>
					))}
					<path className="money-line" d={`M${LEFT} ${line + 0.5}H${width - LEFT}`} />
				</svg>
			</section>
		</>
	)
}

function weekWords({ weekOn, inCents, outCents }: MoneyWeek): string {
	return `${monthDay(weekOn)} in ${formatMoney(inCents)}, out ${formatMoney(outCents)}`
}

type Bar = { cents: number; tall: number }

function Week({
	x,
	line,
	foot,
	weekOn,
	into,
	out,
}: {
	x: number
	line: number
	foot: number
	weekOn: Day
	into: Bar
	out: Bar
}) {
	const middle = x + BAR / 2
	return (
		<g>
			{into.cents > 0 && (
				<>
					<path className="money-in" d={`M${x} ${line}v${-into.tall}h${BAR}v${into.tall}z`} />
					<text className="fc-word" x={middle} y={line - into.tall - 5} textAnchor="middle">
						{dollars(into.cents)}
					</text>
				</>
			)}
			{out.cents > 0 && (
				<>
					<path className="money-out" d={`M${x + 0.5} ${line + 1}v${out.tall}h${BAR - 1}v${-out.tall}z`} />
					<text className="fc-word" x={middle} y={line + out.tall + 15} textAnchor="middle">
						{dollars(out.cents)}
					</text>
				</>
			)}
			<text className="fc-word" x={middle} y={foot} textAnchor="middle">
				{shortMonthDay(weekOn)}
			</text>
		</g>
	)
}
