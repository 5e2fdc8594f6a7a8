import { data, Form, Link, redirect, type ShouldRevalidateFunctionArgs } from "react-router"
import { dayInZone, dayWords, shortMonthDay, timeWords } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { env } from "~/platform/env.server"
import { findTimeline } from "~/services/messages/find-timeline.server"
import { findDeskOrder } from "~/services/orders/find-desk-order.server"
import { findProposal } from "~/services/orders/find-proposal.server"
import { findOrderCredit } from "~/services/receivables/read-credit.server"
import { ConfirmLines } from "~/ui/desk/confirm-lines"
import { LateChangeForm } from "~/ui/desk/late-change-form"
import { OrderSteps } from "~/ui/desk/order-steps"
import { PackedLots } from "~/ui/desk/packed-lots"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { MessageForm } from "~/ui/messages/message-form"
import { OrderTimeline } from "~/ui/messages/order-timeline"
import { Proposal } from "~/ui/messages/proposal"
import { OrderLines, OrderSums } from "~/ui/orders/order-lines"
import { CreditNote } from "~/ui/receivables/credit-note"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/order"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { takeStep } from "./order-step.server"
import { timelineView } from "./order-timeline"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Order ${params.number} · Waxbill` }]

/** The order of an address; 404 unless it is written as a number and there. */
async function orderOf({ producer }: DeskScope, number: string) {
	if (!/^[1-9]\d{0,8}$/.test(number)) throw data(null, { status: 404 })
	const query = { producerId: producer.id, number: Number(number), now: askClock(), zone: producer.timeZone }
	const order = await findDeskOrder(query)
	if (!order) throw data(null, { status: 404 })
	return { order, now: query.now }
}

const DONE: Record<string, string> = {
	confirmed: "is confirmed",
	packed: "is packed",
	sent: "is sent, and its invoice is on its way",
	"sent-for-month": "is sent; it goes on the invoice of the month",
	received: "has arrived",
	cancelled: "is cancelled",
	undone: "waits again; no letter went out",
	asked: "stands as confirmed until the store accepts the change",
	applied: "is changed, and the store is told",
	"taken-back": "stands as confirmed; the change is taken back",
	written: "has your message",
}

export const loader = guard(admits.desk("owner", "desk"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const { order, now } = await orderOf(scope, params.number)
	const zone = scope.producer.timeZone
	const { events: _, ...shown } = order
	const asked = { producerId: scope.producer.id, number: order.number }
	const before = url.searchParams.get("before")
	const timeline = await findTimeline({ ...asked, before })
	const change = order.state === "confirmed" ? await findProposal(asked) : null
	return {
		frame: await findDeskFrame(scope, { part: "orders", day: order.deliveryOn, now }),
		order: shown,
		credit: await findOrderCredit(asked),
		timeline: timelineView(timeline, { zone, side: "desk", before }),
		change: change && {
			...change,
			open: change.open && {
				...change.open,
				asked: `${change.open.who}, ${shortMonthDay(dayInZone(change.open.at, zone))}, ${timeWords(change.open.at, zone)}`,
			},
		},
		messageKey: crypto.randomUUID(),
		undoMinutes: Math.max(1, Math.round(env.UNDO_SECONDS / 60)),
		done: DONE[url.searchParams.get("done") ?? ""] ?? null,
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const { order } = await orderOf(scope, params.number)
	const taken = await takeStep({ form, order, scope })
	if (!taken.ok) return data(taken.refused, { status: taken.status })
	throw redirect(`${url.pathname}?done=${taken.done}`)
})

/** A refusal reads the order again: what can be given may have changed, which is often why it was refused. */
export function shouldRevalidate({ actionStatus, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs): boolean {
	return actionStatus === 422 || defaultShouldRevalidate
}

export default function Order({ loaderData, actionData, params }: Route.ComponentProps) {
	const { order, credit, timeline, change, messageKey, done, undoMinutes } = loaderData
	const base = `/desk/${params.producer}`
	const errors = actionData?.errors ?? {}
	const wrong = Object.entries(errors).map(([field, message]) => {
		const line = order.lines.find((one) => field.endsWith(one.id))
		const words = line ? `${line.code} ${line.name}: ${message}` : message
		return field === "" ? { message: words } : { field, message: words }
	})
	const facts = [order.storeAddress, order.receivingNote].filter(Boolean).join(". ")
	return (
		<DeskBook frame={loaderData.frame} ruled>
			{done && !actionData && (
				<MessageLine tone="saved" title={`Order ${order.number} ${done}.`}>
					{order.canUndo &&
						order.lettersTo.length > 0 &&
						`The letter goes within ${undoMinutes === 1 ? "a minute" : `${undoMinutes} minutes`}; until then you can take it back.`}
				</MessageLine>
			)}
			<SheetHead
				title={`Order ${order.number}, ${order.storeName}`}
				lead={
					<>
						For <Link to={`${base}/orders?day=${order.deliveryOn}`}>{dayWords(order.deliveryOn)}</Link>,{" "}
						{order.state === "placed" ? "waiting to be confirmed" : order.state}.
						{order.isStanding && " Made by their standing order."}
						{order.poNumber && ` Their number ${order.poNumber}.`}
					</>
				}
				note={facts}
			/>
			<ErrorSummary title="Nothing was changed" errors={wrong} />
			{credit && <CreditNote warning={credit.warning} storeHref={`${base}/stores/${credit.storeSlug}`} />}
			{order.state === "placed" ? (
				<ConfirmLines
					order={order}
					whyHref={(code) => `${base}/promise/${encodeURIComponent(code)}?day=${order.deliveryOn}`}
					shareHref={(code) => `${base}/sharing/${encodeURIComponent(code)}/${order.deliveryOn}`}
					values={actionData?.values ?? {}}
					errors={errors}
				/>
			) : (
				<div className="desk:mr-[calc(var(--spacing-margin)-1px)]">
					<OrderLines lines={order.lines} isCancelled={order.state === "cancelled"} />
				</div>
			)}
			{change?.open && (
				<Proposal
					title={`Waits for ${order.storeName} to accept`}
					reason={change.open.reason}
					asked={change.open.asked}
					lines={change.open.lines}
				>
					<Form method="post" preventScrollReset>
						<input type="hidden" name="proposal" value={change.open.id} />
						<Button name="intent" value="take-back">
							Take it back
						</Button>
					</Form>
				</Proposal>
			)}
			{change && !change.open && !(order.canUndo && order.lettersTo.length > 0) && (
				<LateChangeForm
					lines={change.lines}
					storeName={order.storeName}
					values={actionData?.values ?? {}}
					errors={errors}
				/>
			)}
			<div className="order-foot">
				<div>
					<PackedLots
						lines={order.lines}
						lotsHref={`${base}/lots`}
						historyHref={`${base}/orders/${order.number}/lots`}
					/>
					<OrderTimeline {...timeline} />
					{order.note && <p className="mt-3">Their note: {order.note}</p>}
					<MessageForm
						to={order.storeName}
						messageKey={messageKey}
						value={actionData?.values.body}
						error={errors.body}
					/>
				</div>
				<div>
					<OrderSums lines={order.lines} deliveryCents={order.deliveryCents} />
				</div>
				<OrderSteps order={order} base={base} />
			</div>
		</DeskBook>
	)
}
