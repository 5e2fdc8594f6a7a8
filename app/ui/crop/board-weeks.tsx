import { type Day, monthDay, weekday, weekdayName } from "~/domain/calendar"
import type { CropFigure, CropWeek } from "~/domain/crop/board"
import { casesWords } from "~/domain/quantity"
import { FillStrip } from "~/ui/stock/fill-strip"
import { hiveWords } from "./board"

type CropWeeksProps = {
	weeks: readonly CropWeek[]
	heldCases: number
	figure: CropFigure
}

/** Cases expected, by week: the figure that counts, drawn, with the days it falls on and how far it may be out. */
export function CropWeeks({ weeks, heldCases, figure }: CropWeeksProps) {
	return (
		<section className="crop-weeks" aria-labelledby="weeks-head">
			<h2 className="head-italic" id="weeks-head">
				Cases expected, by week
			</h2>
			<ol>
				{heldCases > 0 && (
					<li>
						<p className="crop-week-head">
							<b>Off the hives</b> <span className="fig">{heldCases}</span>
						</p>
						<FillStrip runs={[{ state: "held", count: heldCases }]} caption="held until they are released" />
					</li>
				)}
				{weeks.map((week) => (
					<Week key={week.on} week={week} figure={figure} />
				))}
			</ol>
			{weeks.length === 0 && <p className="note py-2">Nothing is expected from the hives.</p>}
		</section>
	)
}

function Week({ week, figure }: { week: CropWeek; figure: CropFigure }) {
	const { on, low, likely, high, days } = week
	return (
		<li>
			<p className="crop-week-head">
				<b>{monthDay(on)}</b> <span className="fig">{week[figure]}</span>
			</p>
			<FillStrip
				runs={[{ state: "expected", count: likely }]}
				least={low}
				label={`${low} cases at the low figure, ${likely} likely, ${high} at the high`}
				caption={
					<>
						{likely === 0 ? "less than a case likely" : `low ${low}, likely ${likely}, high ${high}`}
						{days.length > 0 && <span className="block">{dayList(days)}</span>}
					</>
				}
			/>
		</li>
	)
}

const MOST_DAYS = 4

const dayList = (days: readonly { on: Day; cases: number }[]) =>
	days.length > MOST_DAYS
		? `from ${weekdayName(weekday(days[0]?.on ?? ""))} on, day by day`
		: days.map(({ on, cases }) => `${weekdayName(weekday(on))} ${cases}`).join(", ")

/** What is asked for and not in stock, and whether the hives bring it. */
export function LackingWords({
	lacking,
	figure,
	readyHives,
	nextWeek,
}: {
	lacking: { cases: number; coveredIn: Day | null }
	figure: CropFigure
	readyHives: readonly string[]
	/** The Monday of the week in which tomorrow lies: what is ready counts there. */
	nextWeek: Day
}) {
	const { cases, coveredIn } = lacking
	if (cases === 0) return <p className="aside">All that is asked for is in stock.</p>
	const needsReady = coveredIn === nextWeek && readyHives.length > 0
	return (
		<p className="aside">
			Asked for but not in stock: <b>{casesWords(cases)}</b>.{" "}
			{coveredIn
				? `The week of ${monthDay(coveredIn)} covers ${cases === 1 ? "it" : "them"}${needsReady ? `, if what is ready on ${hiveWords(readyHives)} comes off` : ""}.`
				: `At the ${figure === "low" ? "low" : "likely"} figure the hives do not bring all of it.`}
		</p>
	)
}
