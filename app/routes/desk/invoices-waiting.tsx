import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, shortDay } from "~/domain/calendar"
import { invoiceRefusalWords } from "~/domain/invoicing/refusal-words"
import { formatMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { issueWaitingNow } from "~/services/invoicing/issue-together.server"
import { listWaiting, type WaitingStore } from "~/services/invoicing/list-waiting.server"
import { counted } from "~/ui/desk/number-words"
import { Button } from "~/ui/forms/button"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invoices-waiting"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "To be invoiced · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_args: Route.LoaderArgs, scope) => {
	const now = askClock()
	const today = dayInZone(now, scope.producer.timeZone)
	return {
		frame: await findDeskFrame(scope, { part: "invoices", now }),
		waiting: await listWaiting({ producerId: scope.producer.id, today }),
		formId: randomUUID(),
	}
})

const issueForm = z.object({ storeId: z.guid(), formId: z.guid() })

export const action = guard(
	admits.desk("owner", "desk"),
	async ({ request, params }: Route.ActionArgs, { producer, person }) => {
		const parsed = issueForm.safeParse(Object.fromEntries(await request.formData()))
		if (!parsed.success) throw data(null, { status: 400 })
		const { storeId, formId } = parsed.data
		const answer = await issueWaitingNow({ producer, storeId, formId, personId: person.id })
		if (answer.ok) throw redirect(`/desk/${params.producer}/invoices/${answer.invoiceNumber}`)
		const problem =
			answer.reason === "nothing-waits" ? "All orders of that store are invoiced already." : invoiceRefusalWords(answer)
		return data({ problem }, { status: 422 })
	},
)

export default function InvoicesWaiting({ loaderData, actionData, params }: Route.ComponentProps) {
	const { waiting, formId } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			{actionData && (
				<MessageLine tone="problem" title="No invoice was issued.">
					{actionData.problem}
				</MessageLine>
			)}
			<SheetHead
				title="To be invoiced"
				lead="Orders that were sent and are on no invoice yet. A month is invoiced by itself in the night after its last day."
				action={<Link to={`${base}/invoices`}>Invoices</Link>}
			/>
			{waiting.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/packing`}>Packing</Link>}>
					Everything that was sent is on an invoice.
				</EmptyLine>
			) : (
				<WaitingTable waiting={waiting} formId={formId} base={base} />
			)}
		</DeskBook>
	)
}

function WaitingTable({ waiting, formId, base }: { waiting: readonly WaitingStore[]; formId: string; base: string }) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Store</th>
					<th scope="col">Orders</th>
					<th scope="col" className="max-desk:hidden">
						Delivered
					</th>
					<th scope="col" className="num">
						About
					</th>
					<th scope="col" className="pr-4! desk:pr-8!">
						<span className="sr-only">What to do</span>
					</th>
				</tr>
			</thead>
			<tbody>
				{waiting.map((store) => (
					<tr key={store.storeId}>
						<td>
							{store.storeName}
							<span className="note block">
								{store.isMonthly ? "one invoice a month" : "each order by itself, sent while it was by the month"}
							</span>
						</td>
						<td>
							<OrderNumbers numbers={store.orderNumbers} base={base} />
						</td>
						<td className="max-desk:hidden">
							{store.firstOn === store.lastOn
								? shortDay(store.firstOn)
								: `${shortDay(store.firstOn)} to ${shortDay(store.lastOn)}`}
						</td>
						<td className="money">{formatMoney(store.aboutCents)}</td>
						<td className="pr-4! desk:pr-8!">
							<Form method="post">
								<input type="hidden" name="storeId" value={store.storeId} />
								<input type="hidden" name="formId" value={formId} />
								<Button size="small" aria-label={`Invoice ${store.storeName} now`}>
									Invoice now
								</Button>
							</Form>
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

const MOST_LINKED = 8

function OrderNumbers({ numbers, base }: { numbers: readonly number[]; base: string }) {
	const shown = numbers.slice(0, MOST_LINKED)
	const more = numbers.length - shown.length
	return (
		<span className="flex flex-wrap gap-x-2">
			{shown.map((number) => (
				<Link key={number} className="inline-block py-1 fig" to={`${base}/orders/${number}`}>
					{number}
				</Link>
			))}
			{more > 0 && <span className="py-1">and {counted(more, "order")} more</span>}
		</span>
	)
}
