import { Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { listCredits } from "~/services/credits/list-credits.server"
import { CreditTable } from "~/ui/credits/credit-table"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/credits"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Credits · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const now = askClock()
	const after = url.searchParams.get("after")
	const list = await listCredits({ producerId: scope.producer.id, storeId: null, after })
	const today = dayInZone(now, scope.producer.timeZone)
	return { frame: await findDeskFrame(scope, { part: "invoices", now }), today, after, ...list }
})

export default function Credits({ loaderData, params }: Route.ComponentProps) {
	const { frame, credits, next, after, today } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={frame}>
			<SheetHead
				title="Credits"
				lead="What was taken off invoices, the latest first. An invoice’s own page issues a credit by hand."
				action={<Link to={`${base}/breakage`}>Broken comb</Link>}
			/>
			{credits.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/invoices`}>See the invoices</Link>}>
					{after ? "Nothing earlier." : "Nothing has been credited yet."}
				</EmptyLine>
			) : (
				<CreditTable credits={credits} today={today} base={base} showStore />
			)}
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier credits" />
		</DeskBook>
	)
}
