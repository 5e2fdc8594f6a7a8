import { Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { listDifferences } from "~/services/payments/list-differences.server"
import { listPayments } from "~/services/payments/list-payments.server"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { PaymentsTable } from "~/ui/payments/payments-table"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/payments"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Payments · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const after = url.searchParams.get("after")
	const list = await listPayments({ producerId: producer.id, after })
	const differences = await listDifferences({ producerId: producer.id })
	return {
		frame: await findDeskFrame(scope, { part: "invoices", now }),
		today: dayInZone(now, producer.timeZone),
		after,
		differences: differences.length,
		...list,
	}
})

export default function Payments({ loaderData, params }: Route.ComponentProps) {
	const { payments, next, today, after, differences } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Payments"
				lead="Money that came in, the latest first. To note a check, cash or a transfer, open the invoice or the store."
				action={
					<Link to={`${base}/stripe-differences`}>
						{differences === 0 ? "Agrees with Stripe" : `${differences} differ from Stripe`}
					</Link>
				}
			/>
			{payments.length === 0 ? (
				<EmptyLine>{after ? "Nothing earlier." : "No money has come in yet."}</EmptyLine>
			) : (
				<PaymentsTable payments={payments} today={today} base={base} />
			)}
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier payments" />
		</DeskBook>
	)
}
