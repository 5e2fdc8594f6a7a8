import { data, Link } from "react-router"
import { z } from "zod"
import { dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { mayRunDesk } from "~/domain/people/roles"
import { findInvoiceRun } from "~/services/invoicing/find-invoice-run.server"
import { counted, countHead } from "~/ui/desk/number-words"
import { RunProgress } from "~/ui/invoicing/run-progress"
import { SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoice-run"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Sending what is packed · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ params }: Route.LoaderArgs, scope) => {
	const runId = z.guid().safeParse(params.run)
	const run = runId.success ? await findInvoiceRun({ producerId: scope.producer.id, runId: runId.data }) : null
	if (!run) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "packing", ...(run.day ? { day: run.day } : {}) }),
		run,
		seesInvoices: scope.roles.some(mayRunDesk),
	}
})

export default function InvoiceRun({ loaderData, params }: Route.ComponentProps) {
	const { run, seesInvoices } = loaderData
	const base = `/desk/${params.producer}`
	const packing = run.day ? `${base}/packing?day=${run.day}` : `${base}/packing`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={run.day ? `Sending for ${dayWords(run.day)}` : "Sending what was packed"}
				lead={leadOf(run)}
				action={<Link to={packing}>Packing</Link>}
			/>
			<RunProgress done={run.done} refused={run.refused.length} waiting={run.waiting} />
			{run.refused.length > 0 && <RefusedTable rows={run.refused} base={base} seesOrders={seesInvoices} />}
			{run.sent.length > 0 && <SentTable rows={run.sent} all={run.done} base={base} seesInvoices={seesInvoices} />}
		</DeskBook>
	)
}

function leadOf({ waiting, done, refused }: Route.ComponentProps["loaderData"]["run"]): string {
	if (waiting > 0) return "Each order is sent and invoiced by itself. You can leave this page: it goes on without you."
	const sent = `${countHead(done)} ${done === 1 ? "order was" : "orders were"} sent`
	if (refused.length === 0) return `${sent}, and their invoices are on their way.`
	return `${sent}; ${counted(refused.length, "order")} could not be, for the reasons below.`
}

type Run = Route.ComponentProps["loaderData"]["run"]

function RefusedTable({ rows, base, seesOrders }: { rows: Run["refused"]; base: string; seesOrders: boolean }) {
	return (
		<table className="sheet-table">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">Not sent</caption>
			<thead>
				<tr>
					<th scope="col">Order</th>
					<th scope="col">Store</th>
					<th scope="col">Why</th>
				</tr>
			</thead>
			<tbody>
				{rows.map((row) => (
					<tr key={row.orderNumber}>
						<td>
							<OrderNumber number={row.orderNumber} base={base} isLinked={seesOrders} />
						</td>
						<td>{row.storeName}</td>
						<td className="short">{row.problem}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

function OrderNumber({ number, base, isLinked }: { number: number; base: string; isLinked: boolean }) {
	if (!isLinked) return <span className="fig">{number}</span>
	return (
		<Link className="inline-block py-1 fig" to={`${base}/orders/${number}`}>
			{number}
		</Link>
	)
}

function SentTable({
	rows,
	all,
	base,
	seesInvoices,
}: {
	rows: Run["sent"]
	all: number
	base: string
	seesInvoices: boolean
}) {
	return (
		<table className="sheet-table">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">
				{all > rows.length ? `Sent, the latest ${rows.length} of ${all}` : "Sent"}
			</caption>
			<thead>
				<tr>
					<th scope="col">Order</th>
					<th scope="col">Store</th>
					{seesInvoices && <th scope="col">Invoice</th>}
					{seesInvoices && (
						<th scope="col" className="num pr-4! desk:pr-8!">
							Total
						</th>
					)}
				</tr>
			</thead>
			<tbody>
				{rows.map((row) => (
					<tr key={row.orderNumber}>
						<td>
							<OrderNumber number={row.orderNumber} base={base} isLinked={seesInvoices} />
						</td>
						<td>{row.storeName}</td>
						{seesInvoices && <td>{invoiceOf(row, base)}</td>}
						{seesInvoices && (
							<td className="money pr-4! desk:pr-8!">{row.totalCents === null ? "" : formatMoney(row.totalCents)}</td>
						)}
					</tr>
				))}
			</tbody>
		</table>
	)
}

function invoiceOf({ invoiceNumber }: Run["sent"][number], base: string) {
	if (invoiceNumber === null) return "with the month’s"
	return (
		<Link className="inline-block py-1 fig" to={`${base}/invoices/${invoiceNumber}`}>
			{invoiceNumber}
		</Link>
	)
}
