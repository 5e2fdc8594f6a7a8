import { Link } from "react-router"
import { now } from "~/platform/clock.server"
import { findStandingYear } from "~/services/standing-orders/find-standing-year.server"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { SeasonTotals } from "~/ui/standing-orders/season-totals"
import { YearTable, yearRow } from "~/ui/standing-orders/year-table"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/standing-year"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Standing order, the year ahead · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async (_args: Route.LoaderArgs, scope) => {
	const at = now()
	const { producer, store } = scope
	const year = await findStandingYear({ producerId: producer.id, storeId: store.id, now: at, zone: producer.timeZone })
	return {
		frame: await findBuyFrame(scope, { part: "standing", now: at }),
		season: year.season,
		rows: year.dates.map((date) => yearRow(date, year)),
	}
})

export default function StandingYear({ loaderData }: Route.ComponentProps) {
	return (
		<BuyBook frame={loaderData.frame}>
			<SheetHead
				title="The year ahead"
				lead="Every date of your standing order in the next twelve months, and until when it can be changed."
				action={
					<Link className="btn" to=".." relative="path">
						Back to the standing order
					</Link>
				}
			/>
			{loaderData.rows.length === 0 ? (
				<EmptyLine>No date lies ahead: no standing order runs.</EmptyLine>
			) : (
				<YearTable rows={loaderData.rows} />
			)}
			<SeasonTotals season={loaderData.season} />
		</BuyBook>
	)
}
