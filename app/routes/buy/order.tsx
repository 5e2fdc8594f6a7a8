import { data, Form, Link, redirect } from "react-router"
import { dayInZone, dayWords, shortMonthDay, timeWords } from "~/domain/calendar"
import { cutoffSoonWords } from "~/domain/delivery/last-orders"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { now as askClock } from "~/platform/clock.server"
import { findTimeline } from "~/services/messages/find-timeline.server"
import { findOrder } from "~/services/orders/find-order.server"
import { findProposal } from "~/services/orders/find-proposal.server"
import { findOrderShares } from "~/services/sharing/find-order-shares.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { MessageForm } from "~/ui/messages/message-form"
import { OrderTimeline } from "~/ui/messages/order-timeline"
import { Proposal } from "~/ui/messages/proposal"
import { OrderLines, OrderSums } from "~/ui/orders/order-lines"
import { stateWords } from "~/ui/orders/state-words"
import { OwnShares } from "~/ui/sharing/own-shares"
import { timelineView } from "../desk/order-timeline"
import { admits, guard, type StoreScope } from "../guard.server"
import type { Route } from "./+types/order"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"
import { takeStep } from "./order-step.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Order ${loaderData?.order.number ?? ""} · Waxbill` },
]

/** The order number of an address; 404 unless it is written as a number. */
function orderQuery({ producer, store }: StoreScope, number: string) {
	if (!/^[1-9]\d{0,8}$/.test(number)) throw data(null, { status: 404 })
	return {
		producerId: producer.id,
		storeId: store.id,
		number: Number(number),
		now: askClock(),
		zone: producer.timeZone,
	}
}

export const loader = guard(admits.store("buyer", "payer"), async ({ params, url }: Route.LoaderArgs, scope) => {
	const query = orderQuery(scope, params.number)
	const { zone, now } = query
	const order = await findOrder(query)
	if (!order) throw data(null, { status: 404 })
	const { cutoffAt, events: _, invoice, ...shown } = order
	const before = url.searchParams.get("before")
	const timeline = await findTimeline({ ...query, before })
	const open = order.state === "confirmed" ? (await findProposal(query)).open : null
	return {
		frame: await findBuyFrame(scope, { part: "deliveries", now }),
		order: shown,
		shares: await findOrderShares(query),
		changeUntil: order.mayCancel && cutoffAt ? cutoffSoonWords(cutoffAt, zone, dayInZone(now, zone)) : null,
		invoiceNumber: invoice && invoiceNumber(invoice.year, invoice.sequence),
		timeline: timelineView(timeline, { zone, side: "store", before }),
		proposal: open && {
			...open,
			asked: `${open.who}, ${shortMonthDay(dayInZone(open.at, zone))}, ${timeWords(open.at, zone)}`,
		},
		answered: ANSWERED[url.searchParams.get("answered") ?? ""] ?? null,
		wasWritten: url.searchParams.has("written"),
		messageKey: crypto.randomUUID(),
		producerName: scope.producer.name,
		wasSent: url.searchParams.has("sent") ? scope.person.email : null,
		wasChanged: url.searchParams.has("changed") ? scope.person.email : null,
		wasCancelled: url.searchParams.has("cancelled"),
	}
})

const ANSWERED: Record<string, string> = {
	accepted: "You have accepted the change.",
	declined: "You have declined the change; the order stands as it was confirmed.",
}

export const action = guard(
	admits.store("buyer", "payer"),
	async ({ request, params, url }: Route.ActionArgs, scope) => {
		const form = await request.formData()
		const taken = await takeStep({ form, scope, query: orderQuery(scope, params.number) })
		if (taken.ok) throw redirect(`${url.pathname}?${taken.search}`)
		return data(taken.refused, { status: 422 })
	},
)

export default function Order({ loaderData, actionData, params }: Route.ComponentProps) {
	const {
		order,
		shares,
		timeline,
		proposal,
		changeUntil,
		invoiceNumber,
		producerName,
		wasSent,
		wasChanged,
		wasCancelled,
	} = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame} ruled>
			{wasSent && order.state === "placed" && (
				<MessageLine tone="saved" title={`${producerName} has your order ${order.number}.`}>
					A letter with all of it goes to {wasSent}.
				</MessageLine>
			)}
			{wasChanged && order.state === "placed" && (
				<MessageLine tone="saved" title={`Order ${order.number} is changed.`}>
					A letter with all of it goes to {wasChanged}.
				</MessageLine>
			)}
			{wasCancelled && order.state === "cancelled" && (
				<MessageLine tone="saved" title={`Order ${order.number} is cancelled.`}>
					What it was promised is free for others again.
				</MessageLine>
			)}
			{!actionData && loaderData.answered && (
				<MessageLine tone="saved" title={loaderData.answered}>
					{producerName} is told.
				</MessageLine>
			)}
			{!actionData && loaderData.wasWritten && (
				<MessageLine tone="saved" title={`${producerName} has your message.`}>
					It stands below, with the order.
				</MessageLine>
			)}
			{actionData?.problem && (
				<MessageLine tone="problem" title={actionData.title}>
					{actionData.problem} {producerName} can still help; see Our details.
				</MessageLine>
			)}
			<ErrorSummary
				title={actionData?.title}
				errors={Object.entries(actionData?.errors ?? {}).map(([field, message]) =>
					field === "" ? { message } : { field, message },
				)}
			/>
			<SheetHead
				title={`Order ${order.number}`}
				lead={
					<>
						For <Link to={`${base}/sheet/${order.deliveryOn}`}>{dayWords(order.deliveryOn)}</Link>,{" "}
						{stateWords(order.state, producerName)}.{order.isStanding && " Made by your standing order."}
						{order.poNumber && ` Your number ${order.poNumber}.`}
					</>
				}
				note={
					changeUntil && (
						<>
							You can change or cancel it until <b>{changeUntil}</b>.
						</>
					)
				}
			/>
			{proposal && (
				<Proposal
					title={`${producerName} asks to change this order`}
					reason={proposal.reason}
					asked={proposal.asked}
					lines={proposal.lines}
				>
					<Form method="post">
						<input type="hidden" name="proposal" value={proposal.id} />
						<Button variant="primary" name="intent" value="accept">
							Accept the change
						</Button>
					</Form>
					<Form method="post">
						<input type="hidden" name="proposal" value={proposal.id} />
						<Button name="intent" value="decline">
							Decline, keep it as confirmed
						</Button>
					</Form>
				</Proposal>
			)}
			<div className="desk:mr-[calc(var(--spacing-margin)-1px)]">
				<OrderLines lines={order.lines} isCancelled={order.state === "cancelled"} />
			</div>
			<OwnShares shares={shares} />
			<div className="order-foot">
				<div>
					<OrderTimeline {...timeline} />
					{order.note && <p className="mt-3">Your note: {order.note}</p>}
					<MessageForm
						to={producerName}
						messageKey={loaderData.messageKey}
						value={actionData?.body}
						error={actionData?.errors.body}
					/>
				</div>
				{order.state === "cancelled" ? (
					<p>Cancelled; nothing is to pay.</p>
				) : (
					<OrderSums lines={order.lines} deliveryCents={order.deliveryCents} />
				)}
				<div className="grid content-start gap-2">
					{invoiceNumber && (
						<Link className="btn" to={`${base}/invoices/${invoiceNumber}`}>
							Invoice {invoiceNumber}
						</Link>
					)}
					{order.mayCancel && (
						<Link className="btn" to={`${base}/sheet/${order.deliveryOn}?order=${order.number}`}>
							Change this order
						</Link>
					)}
					<Link className="btn" to={`${base}/sheet?again=${order.number}`}>
						Order this again
					</Link>
					{order.mayCancel && (
						<Form method="post">
							<Button name="intent" value="cancel" className="w-full">
								Cancel this order
							</Button>
						</Form>
					)}
				</div>
			</div>
		</BuyBook>
	)
}
