import { Link } from "react-router"
import { addDays, dayInZone, daysBetween, weekday, weekdayName } from "~/domain/calendar"
import { mondayOf } from "~/domain/crop/forecast"
import { mayRunDesk } from "~/domain/people/roles"
import { now as askClock } from "~/platform/clock.server"
import { findBoard } from "~/services/crop/find-board.server"
import { YardBoard } from "~/ui/crop/board"
import { CropWeeks, LackingWords } from "~/ui/crop/board-weeks"
import { CropLinks } from "~/ui/crop/crop-links"
import { SuperKey } from "~/ui/crop/super-key"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { ButtonLink } from "~/ui/forms/button"
import { EmptyLine } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/crop"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Crop · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, roles } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const yardId = url.searchParams.get("yard")
	const after = url.searchParams.get("after")
	const board = await findBoard({ producerId: producer.id, today, yardId, after })
	const nextOff = board.weeks.flatMap(({ days }) => days).find(({ on }) => daysBetween(today, on) < 7)?.on ?? null
	return {
		frame: await findDeskFrame(scope, { part: "crop", now, ...(nextOff ? { day: nextOff } : {}) }),
		...board,
		yardId,
		after,
		nextOff,
		nextWeek: mondayOf(addDays(today, 1)),
		maySet: roles.includes("owner"),
		maySetUp: roles.some(mayRunDesk),
	}
})

export default function Crop({ loaderData, params }: Route.ComponentProps) {
	const { yards, summaries, weeks, nextOff, yardId, after, next } = loaderData
	const base = `/desk/${params.producer}/crop`
	const ready = summaries.filter(({ id }) => !yardId || id === yardId).flatMap((yard) => yard.ready)
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<header className="crop-head">
				<div className="crop-head-main">
					<h1 className="title">{nextOff ? `Off the hives by ${weekdayName(weekday(nextOff))}` : "On the hives"}</h1>
					<SuperKey />
				</div>
				<p className="aside">
					One block is one super seen from above. The day below it is when it should be {loaderData.readyCappedPercent}{" "}
					% capped.
				</p>
			</header>
			<CropLinks
				links={[
					{ to: `${base}/mark`, label: "Mark several supers" },
					...(loaderData.maySetUp ? [{ to: `${base}/set-up`, label: "Yards and hives" }] : []),
					...(loaderData.maySetUp
						? [{ to: `/desk/${params.producer}/season`, label: "The season ahead: what will be short" }]
						: []),
					{ to: `${base}/forecasts`, label: "Forecasts and what came off" },
					...(loaderData.maySet ? [{ to: `${base}/settings`, label: "Crop settings" }] : []),
				]}
			/>
			{summaries.length > 1 && (
				<FilterLinks
					label="One yard"
					name="yard"
					chosen={yardId ?? ""}
					options={[
						{ value: "", label: "All yards" },
						...summaries.map(({ id, name, ready: off }) => ({
							value: id,
							label: off.length > 0 ? `${name} (${off.length} ready)` : name,
						})),
					]}
				/>
			)}
			<div className="crop-board">
				<div className="min-w-0">
					{yards.map((yard) => (
						<YardBoard key={yard.id} yard={yard} base={base} />
					))}
					{yards.length === 0 && (
						<EmptyLine action={loaderData.maySetUp && <Link to={`${base}/set-up`}>Enter yards and hives</Link>}>
							{after ? "No more hives." : "No hives are entered here yet."}
						</EmptyLine>
					)}
					<ListPages
						params={{ ...(yardId ? { yard: yardId } : {}), ...(after ? { after } : {}) }}
						next={next}
						laterWords="More hives"
					/>
				</div>
				<div>
					<CropWeeks weeks={weeks} heldCases={loaderData.heldCases} figure={loaderData.figure} />
					<div className="crop-plan">
						<LackingWords
							lacking={loaderData.lacking}
							figure={loaderData.figure}
							readyHives={ready.map(({ hive }) => hive)}
							nextWeek={loaderData.nextWeek}
						/>
						{ready.length > 0 && (
							<ButtonLink variant="primary" to={`${base}/harvest?${harvestSearch(ready)}`}>
								{nextOff ? `Plan ${weekdayName(weekday(nextOff))}'s round` : "Plan the round"}
							</ButtonLink>
						)}
					</div>
				</div>
			</div>
		</DeskBook>
	)
}

/** The supers chosen, in the address of the harvest page. */
const harvestSearch = (ready: readonly { superId: string }[]) =>
	new URLSearchParams(ready.map(({ superId }) => ["super", superId]))
