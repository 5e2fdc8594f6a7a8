import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayWords, isDay, shortDay, shortMonthDay } from "~/domain/calendar"
import { findPacking } from "~/services/desk/find-packing.server"
import { startInvoiceRun } from "~/services/invoicing/start-invoice-run.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { sendOrder } from "~/services/orders/send-order.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { counted, countHead } from "~/ui/desk/number-words"
import { PackingOrders, PickTable } from "~/ui/desk/packing-sheet"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/packing"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { orderProblem } from "./order-words"
import { readWeights, weightProblems } from "./weigh-form"

export const meta: Route.MetaFunction = () => [{ title: "Packing · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const asked = url.searchParams.get("day")
	const { days, day, picks, orders } = await findPacking({
		producerId: scope.producer.id,
		day: asked && isDay(asked) ? asked : null,
	})
	return {
		frame: await findDeskFrame(scope, { part: "packing", ...(day ? { day } : {}) }),
		days: days.map((on) => ({ value: on, label: shortDay(on) })),
		day,
		picks: picks.map(({ bestBeforeOn, ...pick }) => ({ ...pick, bestBefore: shortMonthDay(bestBeforeOn) })),
		orders,
		done: url.searchParams.get("done"),
		runId: randomUUID(),
	}
})

const step = z.object({
	intent: z.enum(["pack", "send"]),
	number: z.coerce.number().int().min(1).max(999_999_999),
	day: z.string().refine(isDay),
})

const sendAll = z.object({ intent: z.literal("send-all"), day: z.string().refine(isDay), runId: z.guid() })

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, url }: Route.ActionArgs, { producer, person }) => {
		const form = await request.formData()
		const all = sendAll.safeParse(Object.fromEntries(form))
		if (all.success) {
			const started = await startInvoiceRun({ ...all.data, producerId: producer.id, personId: person.id })
			if (started.ok) throw redirect(`${url.pathname}/runs/${started.runId}`)
			const problem = "Nothing of that day is packed any more: it was sent already, or taken back."
			return data({ number: 0, values: {}, errors: {}, sure: {}, problem }, { status: 422 })
		}
		const parsed = step.safeParse(Object.fromEntries(form))
		if (!parsed.success) throw data(null, { status: 400 })
		const { intent, number, day } = parsed.data
		const query = { producerId: producer.id, number, personId: person.id }
		const { values, weighed, ...typed } = readWeights(form)
		if (Object.keys(typed.errors).length > 0) return data({ number, values, ...typed, problem: null }, { status: 422 })
		const sending = intent === "send" ? await sendOrder({ ...query, producer }) : null
		const answer = sending ?? (await packOrder({ ...query, weighed }))
		if (answer.ok) {
			const done = `Order ${number} is ${sending?.ok ? sentWords(sending.invoiceNumber) : "packed"}.`
			throw redirect(`${url.pathname}?${new URLSearchParams({ day, done })}`)
		}
		if (answer.reason === "no-such-order") throw data(null, { status: 404 })
		if (answer.reason === "weights") {
			return data({ number, values, ...weightProblems(answer.refused, weighed), problem: null }, { status: 422 })
		}
		return data({ number, values, ...typed, problem: orderProblem(number, answer) }, { status: 422 })
	},
)

function sentWords(invoiceNumber: string | null): string {
	if (invoiceNumber !== null) return `sent, and its invoice ${invoiceNumber} is on its way`
	return "sent; it goes on the invoice of the month"
}

export default function Packing({ loaderData, actionData, params }: Route.ComponentProps) {
	const { days, day, picks, orders, done } = loaderData
	const packed = orders.filter((order) => order.state === "packed").length
	const lead =
		orders.length === 0
			? "Nothing to pack."
			: `${countHead(orders.length)} ${orders.length === 1 ? "stop" : "stops"}; ${packed === 0 ? "none packed yet" : `${counted(packed, "order")} packed`}.`
	return (
		<DeskBook frame={loaderData.frame}>
			{actionData?.problem && (
				<MessageLine tone="problem" title="That could not be done.">
					{actionData.problem}
				</MessageLine>
			)}
			{!actionData && done && <MessageLine tone="saved" title={done} />}
			{actionData && (
				<ErrorSummary
					title={`Order ${actionData.number} is not packed yet`}
					errors={Object.entries(actionData.errors).map(([field, message]) => ({ field, message }))}
				/>
			)}
			<SheetHead
				title={day ? `Packing for ${dayWords(day)}` : "Packing"}
				lead={lead}
				action={day && packed > 1 && <SendAll day={day} packed={packed} runId={loaderData.runId} />}
			/>
			{days.length > 1 && (
				<div className="no-print">
					<FilterLinks label="Days with orders to pack" name="day" chosen={day ?? ""} options={days} />
				</div>
			)}
			{orders.length === 0 || !day ? (
				<EmptyLine action={<Link to={`/desk/${params.producer}`}>To do</Link>}>
					No order of that day is confirmed and waiting to be packed.
				</EmptyLine>
			) : (
				<>
					{picks.length > 0 && <PickTable picks={picks} lotsHref={`/desk/${params.producer}/lots`} />}
					<PackingOrders orders={orders} day={day} posted={actionData ?? null} />
				</>
			)}
		</DeskBook>
	)
}

/** Sends and invoices everything that is packed for the day; a page of its own then shows how far it is. */
function SendAll({ day, packed, runId }: { day: string; packed: number; runId: string }) {
	return (
		<Form method="post" className="no-print">
			<input type="hidden" name="day" value={day} />
			<input type="hidden" name="runId" value={runId} />
			<Button name="intent" value="send-all">
				Send all {packed} packed, with their invoices
			</Button>
		</Form>
	)
}
