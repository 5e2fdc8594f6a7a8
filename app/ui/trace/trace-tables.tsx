import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import type { OrderState } from "~/domain/orders/order-states"
import type { Place } from "~/domain/stock/places"
import { counted } from "~/ui/desk/number-words"
import { PLACE_WORDS } from "./place-words"

type Order = {
	storeId: string
	number: number
	state: OrderState
	deliveryOn: Day
	storeName: string
	lot: string
	pieces: number
}
type MarketDay = { id: string; marketName: string; marketOn: Day; lot: string; sold: number; onTable: number }
type Left = { code: string; productName: string; places: readonly { place: Place; pieces: number }[] }

const sum = (numbers: readonly number[]) => numbers.reduce((all, one) => all + one, 0)

/** Orders with pieces of the traced lots, by delivery day. `ordersHref` is null for those who may not open orders. */
export function TracedOrders({ orders, ordersHref }: { orders: readonly Order[]; ordersHref: string | null }) {
	if (orders.length === 0) return <p className="empty-line">No store has had pieces of it.</p>
	return (
		<table className="sheet-table beside-margin">
			<caption className="head-italic px-4 pt-3 pb-1 text-left desk:px-8">Stores that had pieces</caption>
			<thead>
				<tr>
					<th scope="col">Store</th>
					<th scope="col">Order</th>
					<th scope="col" className="max-desk:hidden">
						Delivery
					</th>
					<th scope="col">Lot</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Pieces
					</th>
				</tr>
			</thead>
			<tbody>
				{orders.map((order) => (
					<tr key={`${order.number} ${order.lot}`}>
						<td>
							{order.storeName}
							<span className="note block desk:hidden">{fullDay(order.deliveryOn)}</span>
						</td>
						<td>
							{ordersHref === null ? (
								order.number
							) : (
								<Link className="inline-block py-1" to={`${ordersHref}/${order.number}`}>
									{order.number}
								</Link>
							)}
							, {order.state}
						</td>
						<td className="max-desk:hidden">{fullDay(order.deliveryOn)}</td>
						<td>{order.lot}</td>
						<td className="num fig pr-4! desk:pr-8!">{order.pieces}</td>
					</tr>
				))}
			</tbody>
			<tfoot>
				<tr>
					<td colSpan={3}>
						<b>{counted(new Set(orders.map(({ storeId }) => storeId)).size, "store")}</b>
					</td>
					<td className="max-desk:hidden" />
					<td className="num fig pr-4! desk:pr-8!">
						<b>{sum(orders.map(({ pieces }) => pieces))}</b>
					</td>
				</tr>
			</tfoot>
		</table>
	)
}

/** Market days on which pieces of the traced lots were sold. */
export function TracedMarketDays({ marketDays }: { marketDays: readonly MarketDay[] }) {
	if (marketDays.length === 0) return null
	return (
		<table className="sheet-table beside-margin mt-6">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">Market days</caption>
			<thead>
				<tr>
					<th scope="col">Market</th>
					<th scope="col">Day</th>
					<th scope="col">Lot</th>
					<th scope="col" className="num">
						On the table
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Sold
					</th>
				</tr>
			</thead>
			<tbody>
				{marketDays.map((day) => (
					<tr key={`${day.id} ${day.lot}`}>
						<td>{day.marketName}</td>
						<td>{fullDay(day.marketOn)}</td>
						<td>{day.lot}</td>
						<td className="num fig">{day.onTable}</td>
						<td className="num fig pr-4! desk:pr-8!">{day.sold}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

/** What is left of the traced lots, and where. */
export function LeftWhere({ lots, lotsHref }: { lots: readonly Left[]; lotsHref: string }) {
	return (
		<table className="sheet-table beside-margin mt-6">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">Where the pieces are now</caption>
			<thead>
				<tr>
					<th scope="col">Lot</th>
					<th scope="col">Product</th>
					<th scope="col" className="pr-4! desk:pr-8!">
						Places
					</th>
				</tr>
			</thead>
			<tbody>
				{lots.map((lot) => (
					<tr key={lot.code}>
						<td>
							<Link className="inline-block py-1" to={`${lotsHref}/${encodeURIComponent(lot.code)}`}>
								{lot.code}
							</Link>
						</td>
						<td>{lot.productName}</td>
						<td className="pr-4! desk:pr-8!">
							{lot.places.map(({ place, pieces }) => `${PLACE_WORDS[place].toLowerCase()} ${pieces}`).join(", ") ||
								"none"}
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
