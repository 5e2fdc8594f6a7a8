import { data, Form, Link, redirect } from "react-router"
import { dayInZone, dayWords, shortMonthDay, timeWords } from "~/domain/calendar"
import { cutoffSoonWords } from "~/domain/delivery/last-orders"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { now as askClock } from "~/platform/clock.server"
import { cancelOrder } from "~/services/orders/cancel-order.server"
import { findOrder } from "~/services/orders/find-order.server"
import { findOrderShares } from "~/services/sharing/find-order-shares.server"
import { Button } from "~/ui/forms/button"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { OrderLines, OrderSums } from "~/ui/orders/order-lines"
import { EVENT_WORDS, stateWords } from "~/ui/orders/state-words"
import { OwnShares } from "~/ui/sharing/own-shares"
import { admits, guard, type StoreScope } from "../guard.server"
import type { Route } from "./+types/order"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

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
	const { cutoffAt, events, invoice, ...shown } = order
	return {
		frame: await findBuyFrame(scope, { part: "deliveries", now }),
		order: shown,
		shares: await findOrderShares(query),
		changeUntil: order.mayCancel && cutoffAt ? cutoffSoonWords(cutoffAt, zone, dayInZone(now, zone)) : null,
		invoiceNumber: invoice && invoiceNumber(invoice.year, invoice.sequence),
		timeline: events.map(({ kind, at, who }) => ({
			what: EVENT_WORDS[kind],
			who,
			at: at.toISOString(),
			when: `${shortMonthDay(dayInZone(at, zone))}, ${timeWords(at, zone)}`,
		})),
		producerName: scope.producer.name,
		wasSent: url.searchParams.has("sent") ? scope.person.email : null,
		wasChanged: url.searchParams.has("changed") ? scope.person.email : null,
		wasCancelled: url.searchParams.has("cancelled"),
	}
})

export const action = guard(
	admits.store("buyer", "payer"),
	async ({ request, params, url }: Route.ActionArgs, scope) => {
		const form = await request.formData()
		if (form.get("intent") !== "cancel") throw data(null, { status: 400 })
		const answer = await cancelOrder({ ...orderQuery(scope, params.number), personId: scope.person.id })
		if (answer.ok) throw redirect(`${url.pathname}?cancelled`)
		if (answer.reason === "unknown") throw data(null, { status: 404 })
		const problem =
			answer.state === "placed" ? "Last orders for this delivery have passed." : `It is ${answer.state} already.`
		return data({ problem }, { status: 422 })
	},
)

export default function Order({ loaderData, actionData, params }: Route.ComponentProps) {
	const { order, shares, timeline, changeUntil, invoiceNumber, producerName, wasSent, wasChanged, wasCancelled } =
		loaderData
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
			{actionData && (
				<MessageLine tone="problem" title="The order could not be cancelled.">
					{actionData.problem} {producerName} can still help; see Our details.
				</MessageLine>
			)}
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
			<div className="desk:mr-[calc(var(--spacing-margin)-1px)]">
				<OrderLines lines={order.lines} isCancelled={order.state === "cancelled"} />
			</div>
			<OwnShares shares={shares} />
			<div className="order-foot">
				<section aria-labelledby="timeline">
					<h2 className="head-italic" id="timeline">
						What has happened
					</h2>
					<ol className="mt-2 grid gap-1">
						{timeline.map(({ what, who, at, when }) => (
							<li key={`${what} ${at}`}>
								<b>{what}</b>
								{who && ` by ${who}`}{" "}
								<time className="note" dateTime={at}>
									{when}
								</time>
							</li>
						))}
					</ol>
					{order.note && <p className="mt-3">Your note: {order.note}</p>}
				</section>
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
