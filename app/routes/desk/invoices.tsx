import { Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { type InvoiceFilter, listInvoices } from "~/services/invoicing/list-invoices.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { InvoiceTable } from "~/ui/invoicing/invoice-table"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoices"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Invoices · Waxbill" }]

const FILTERS: readonly { value: InvoiceFilter; label: string }[] = [
	{ value: "open", label: "To be paid" },
	{ value: "late", label: "Late" },
	{ value: "paid", label: "Paid" },
]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const filter = FILTERS.find(({ value }) => value === url.searchParams.get("standing"))?.value ?? "all"
	const after = url.searchParams.get("after")
	const list = await listInvoices({ producerId: producer.id, storeId: null, filter, today, after })
	return { frame: await findDeskFrame(scope, { part: "invoices", now }), today, filter, after, ...list }
})

export default function Invoices({ loaderData, params }: Route.ComponentProps) {
	const { invoices, next, today, filter, after } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Invoices"
				lead="What is still to be paid comes first, then what is paid, the latest first."
				action={
					<span className="flex flex-wrap gap-x-5">
						<Link to={`${base}/invoices/waiting`}>To be invoiced</Link>
						<Link to={`${base}/tax-rates`}>Sales tax</Link>
						<Link to={`${base}/payments`}>Payments</Link>
						<Link to={`${base}/receivables`}>Who owes what</Link>
						<Link to={`${base}/credits`}>Credits</Link>
						<Link to={`${base}/breakage`}>Broken comb</Link>
						<Link to={`${base}/books`}>Books</Link>
						<Link to={`${base}/figures`}>What was sold</Link>
					</span>
				}
			/>
			<FilterLinks
				label="Invoices by how they stand"
				name="standing"
				chosen={filter === "all" ? "" : filter}
				options={[{ value: "", label: "All" }, ...FILTERS]}
			/>
			{invoices.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/invoices`}>All invoices</Link>}>
					{after ? "Nothing earlier." : filter === "all" ? "Nothing has been invoiced yet." : "No such invoice."}
				</EmptyLine>
			) : (
				<InvoiceTable invoices={invoices} today={today} base={base} showStore />
			)}
			<ListPages
				params={{ ...(filter === "all" ? {} : { standing: filter }), ...(after ? { after } : {}) }}
				next={next}
				laterWords="Earlier invoices"
			/>
		</DeskBook>
	)
}
