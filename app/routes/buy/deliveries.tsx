import { Link } from "react-router"
import { dayInZone, weekday, weekdayName } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { type ListedOrder, listStoreOrders } from "~/services/orders/list-store-orders.server"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { listDay, stateWords } from "~/ui/orders/state-words"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/deliveries"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Deliveries · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const now = askClock()
	const after = url.searchParams.get("after")
	const { orders, next } = await listStoreOrders({ producerId: producer.id, storeId: store.id, after })
	return {
		frame: await findBuyFrame(scope, { part: "deliveries", now }),
		today: dayInZone(now, producer.timeZone),
		producerName: producer.name,
		orders,
		next,
		isFirstPage: after === null,
	}
})

/** "7 cases", "5 of 7 cases", "5 cases, 2 to be shared out". */
function howMany({ askedCases, cases, toShareCases }: ListedOrder): string {
	if (toShareCases > 0) return `${cases} cases sure, ${toShareCases} to be shared out`
	if (cases < askedCases) return `${cases} of ${askedCases} cases`
	return cases === 1 ? "1 case" : `${cases} cases`
}

export default function Deliveries({ loaderData, params }: Route.ComponentProps) {
	const { orders, next, today, producerName, isFirstPage } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	return (
		<BuyBook frame={loaderData.frame}>
			<SheetHead title="Deliveries" lead="All that you have ordered, the latest delivery first." />
			{orders.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/sheet`}>Open the order sheet</Link>}>
					{isFirstPage ? "Nothing ordered yet." : "Nothing earlier."}
				</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Delivery</th>
							<th scope="col">Order</th>
							<th scope="col">How it stands</th>
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
									<b>{listDay(order.deliveryOn, today)}</b>{" "}
									<span className="note block">{weekdayName(weekday(order.deliveryOn))}</span>
								</td>
								<td>
									<Link className="inline-block py-1 fig" to={`${base}/orders/${order.number}`}>
										Order {order.number}
									</Link>
								</td>
								<td>
									{stateWords(order.state, producerName)}
									<span className="note block desk:hidden">{howMany(order)}</span>
								</td>
								<td className="num max-desk:hidden">{howMany(order)}</td>
								<td className="money pr-4! desk:pr-8!">
									{order.state === "cancelled" ? "" : formatMoney(order.totalCents)}
								</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
			<nav className="flex gap-6 px-4 py-4 desk:px-8" aria-label="Pages">
				{!isFirstPage && (
					<Link className="py-1" to={`${base}/deliveries`}>
						Back to the latest
					</Link>
				)}
				{next && (
					<Link className="py-1" to={`${base}/deliveries?after=${next}`}>
						Earlier deliveries
					</Link>
				)}
			</nav>
		</BuyBook>
	)
}
