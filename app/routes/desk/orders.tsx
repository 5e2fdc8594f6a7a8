import { Link } from "react-router"
import { dayInZone, dayWords, isDay, weekday, weekdayName } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { type OrderState, orderStates } from "~/domain/orders/order-states"
import { casesWords } from "~/domain/quantity"
import { now as askClock } from "~/platform/clock.server"
import { type DeskOrderRow, listDeskOrders } from "~/services/orders/list-desk-orders.server"
import { listFreeOnDay } from "~/services/promise/list-free-on-day.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { listDay } from "~/ui/orders/state-words"
import { FreeOnDay } from "~/ui/stock/free-on-day"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/orders"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Orders · Waxbill" }]

const STATE_WORDS: Record<OrderState, string> = {
	placed: "waiting",
	confirmed: "confirmed",
	packed: "packed",
	sent: "sent",
	received: "received",
	cancelled: "cancelled",
}

const isState = (text: string | null): text is OrderState => orderStates.some((state) => state === text)

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const stateText = url.searchParams.get("state")
	const dayText = url.searchParams.get("day")
	const state = isState(stateText) ? stateText : null
	const day = dayText && isDay(dayText) ? dayText : null
	const after = url.searchParams.get("after")
	const { orders, next } = await listDeskOrders({ producerId: producer.id, state, day, after })
	const today = dayInZone(now, producer.timeZone)
	return {
		frame: await findDeskFrame(scope, { part: "orders", now, ...(day ? { day } : {}) }),
		today,
		free: day && day >= today ? await listFreeOnDay({ producerId: producer.id, day, today }) : [],
		state,
		day,
		after,
		orders,
		next,
	}
})

/** "7 cases", "5 of 7 cases", "5 cases, 2 to be shared out". */
function howMany({ askedCases, cases, toShareCases }: DeskOrderRow): string {
	if (toShareCases > 0) return `${casesWords(cases)}, ${toShareCases} to be shared out`
	return cases < askedCases ? `${cases} of ${casesWords(askedCases)}` : casesWords(cases)
}

export default function Orders({ loaderData, params }: Route.ComponentProps) {
	const { orders, next, today, free, state, day, after } = loaderData
	const base = `/desk/${params.producer}`
	const keep: Record<string, string> = day ? { day } : {}
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={day ? `Orders for ${dayWords(day)}` : "Orders"}
				lead={
					day ? (
						<>
							What stores have asked for that day. <Link to={`${base}/orders`}>All days</Link>
						</>
					) : (
						"All that stores have asked for, the latest delivery first."
					)
				}
			/>
			<FilterLinks
				label="Orders by state"
				name="state"
				chosen={state ?? ""}
				keep={keep}
				options={[{ value: "", label: "All" }, ...orderStates.map((one) => ({ value: one, label: STATE_WORDS[one] }))]}
			/>
			{orders.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/orders`}>All orders</Link>}>
					{after ? "Nothing earlier." : state || day ? "No such order." : "No store has ordered yet."}
				</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Delivery</th>
							<th scope="col">Order</th>
							<th scope="col">Store</th>
							<th scope="col" className="max-desk:hidden">
								How it stands
							</th>
							<th scope="col" className="num max-desk:hidden">
								Cases
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								Amount
							</th>
						</tr>
					</thead>
					<tbody>
						{orders.map((order) => (
							<tr key={order.number} className={order.state === "cancelled" ? "text-ink-faint" : undefined}>
								<td>
									<b>{listDay(order.deliveryOn, today)}</b>
									<span className="note block">{weekdayName(weekday(order.deliveryOn))}</span>
								</td>
								<td>
									<Link className="inline-block py-1 fig" to={`${base}/orders/${order.number}`}>
										{order.number}
									</Link>
								</td>
								<td>
									{order.storeName}
									<span className="note block desk:hidden">
										{STATE_WORDS[order.state]}, {howMany(order)}
									</span>
								</td>
								<td className="max-desk:hidden">{STATE_WORDS[order.state]}</td>
								<td className="num max-desk:hidden">{howMany(order)}</td>
								<td className="money pr-4! desk:pr-8!">
									{order.state === "cancelled" ? "" : formatMoney(order.totalCents)}
								</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
			<ListPages
				params={{ ...keep, ...(state ? { state } : {}), ...(after ? { after } : {}) }}
				next={next}
				laterWords="Earlier orders"
			/>
			<FreeOnDay
				products={free}
				today={today}
				whyHref={(code) => `${base}/promise/${encodeURIComponent(code)}?day=${day}`}
			/>
		</DeskBook>
	)
}
