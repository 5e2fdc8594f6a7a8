import { Link } from "react-router"
import { dayInZone, dayWords } from "~/domain/calendar"
import { marketHours } from "~/domain/stall/market-hours"
import { now } from "~/platform/clock.server"
import { listMarketDays } from "~/services/stall/find-market-days.server"
import { StallFrame } from "~/ui/layout/stall-frame"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/days"
import { viewerOf } from "./viewer.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Market days · ${loaderData?.yardName ?? "Waxbill"}` },
]

export const loader = guard(admits.stall, async (_args: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const today = dayInZone(now(), producer.timeZone)
	const days = await listMarketDays({ producerId: producer.id, today, viewer: viewerOf(scope) })
	return { yardName: producer.name, slug: producer.slug, today, days }
})

/** The market days that a person is named on: those to come first, then those that are over. */
export default function StallDays({ loaderData }: Route.ComponentProps) {
	const { yardName, slug, today, days } = loaderData
	const list = (shown: typeof days) => <DayList days={shown} base={`/stall/${slug}`} today={today} />
	const over = days.filter(({ state }) => state === "closed")
	const ahead = days.filter(({ state }) => state !== "closed")
	return (
		<StallFrame title={`Market days of ${yardName}`}>
			{days.length === 0 && <p className="stall-words">You are not named on a market day yet. The yard does that.</p>}
			{ahead.length > 0 && list(ahead)}
			{over.length > 0 && (
				<>
					<h2 className="stall-head">Over</h2>
					{list(over)}
				</>
			)}
		</StallFrame>
	)
}

const STATE_WORDS = { planned: "not loaded yet", open: "open", closed: "closed" }

type DayListProps = { days: Route.ComponentProps["loaderData"]["days"]; base: string; today: string }

function DayList({ days, base, today }: DayListProps) {
	return (
		<ul>
			{days.map((day) => (
				<li key={day.id}>
					<Link className="stall-day" to={`${base}/${day.id}`} aria-current={day.on === today ? "date" : undefined}>
						<b className="name">{day.on === today ? `Today, ${dayWords(day.on)}` : dayWords(day.on)}</b>
						<span>
							{day.marketName}, {marketHours(day)}
						</span>
						<span>{STATE_WORDS[day.state]}</span>
					</Link>
				</li>
			))}
		</ul>
	)
}
