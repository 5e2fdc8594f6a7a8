import { Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { listInvoices } from "~/services/invoicing/list-invoices.server"
import { ListPages } from "~/ui/desk/list-pages"
import { InvoiceTable } from "~/ui/invoicing/invoice-table"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoices"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Invoices · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const after = url.searchParams.get("after")
	const list = await listInvoices({ producerId: producer.id, storeId: store.id, filter: "all", today, after })
	return { frame: await findBuyFrame(scope, { part: "invoices", now }), today, after, ...list }
})

export default function Invoices({ loaderData, params }: Route.ComponentProps) {
	const { invoices, next, today, after } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			<SheetHead
				title="Invoices"
				lead="What is still to pay comes first, then what is paid, the latest first."
				action={<Link to={`${base}/credits`}>Credits</Link>}
			/>
			{invoices.length === 0 ? (
				<EmptyLine>
					{after ? "Nothing earlier." : "No invoice yet. The first comes with your first delivery."}
				</EmptyLine>
			) : (
				<InvoiceTable invoices={invoices} today={today} base={base} />
			)}
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier invoices" />
		</BuyBook>
	)
}
