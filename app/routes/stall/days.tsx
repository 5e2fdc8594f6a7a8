import { Link } from "react-router"
import { dayInZone, dayWords } from "~/domain/calendar"
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

const STATE_WORDS = { planned: "not loaded yet", open: "open", closed: "closed" }

/** The market days that a person is named on: today's first in mind, the others to look at. */
export default function StallDays({ loaderData }: Route.ComponentProps) {
	const { yardName, slug, today, days } = loaderData
	return (
		<StallFrame title={`Market days of ${yardName}`}>
			{days.length === 0 ? (
				<p className="p-4 text-figure">You are not named on a market day yet. The yard does that.</p>
			) : (
				<ul>
					{days.map((day) => (
						<li key={day.id} className="border-b border-rule">
							<Link
								className="stall-day"
								to={`/stall/${slug}/${day.id}`}
								aria-current={day.on === today ? "date" : undefined}
							>
								<b className="name">{day.on === today ? `Today, ${dayWords(day.on)}` : dayWords(day.on)}</b>
								<span>
									{day.marketName}, {day.opensAt.slice(0, 5)} to {day.closesAt.slice(0, 5)}
								</span>
								<span>{STATE_WORDS[day.state]}</span>
							</Link>
						</li>
					))}
				</ul>
			)}
		</StallFrame>
	)
}
