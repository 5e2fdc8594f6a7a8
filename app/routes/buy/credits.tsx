import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { listCredits } from "~/services/credits/list-credits.server"
import { CreditTable } from "~/ui/credits/credit-table"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/credits"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Credits · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const now = askClock()
	const after = url.searchParams.get("after")
	const list = await listCredits({ producerId: producer.id, storeId: store.id, after })
	const today = dayInZone(now, producer.timeZone)
	return { frame: await findBuyFrame(scope, { part: "invoices", now }), today, after, ...list }
})

export default function Credits({ loaderData, params }: Route.ComponentProps) {
	const { frame, credits, next, after, today } = loaderData
	return (
		<BuyBook frame={frame}>
			<SheetHead title="Credits" lead="What was taken off your invoices, the latest first." />
			{credits.length === 0 ? (
				<EmptyLine>{after ? "Nothing earlier." : "Nothing has been credited."}</EmptyLine>
			) : (
				<CreditTable credits={credits} today={today} base={`/buy/${params.producer}/${params.store}`} />
			)}
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier credits" />
		</BuyBook>
	)
}
