import { Link } from "react-router"
import { type Day, dayWords, fullDay } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"

type WithdrawalReachProps = {
	packedOrders: readonly { number: number; storeName: string; lot: string; pieces: number; deliveryOn?: Day }[]
	marketDays: readonly { id: string; marketName: string; marketOn: Day; lot: string; sold: number; onTable: number }[]
	/** Where an order is opened; without it orders are named only. */
	ordersHref?: string
}

/** What letters do not reach: orders that stand packed, pieces on a market table, and what the public bought. */
export function WithdrawalReach({ packedOrders, marketDays, ordersHref }: WithdrawalReachProps) {
	return (
		<>
			{packedOrders.length > 0 && (
				<section className="sheet-part" aria-labelledby="packed-from">
					<h2 className="head-italic" id="packed-from">
						Packed and not sent
					</h2>
					<p>These must not leave. Open each, cancel it, and its pieces go back to the ready shelf.</p>
					<ul>
						{packedOrders.map(({ number, storeName, lot, pieces, deliveryOn }) => (
							<li key={`${number} ${lot}`} className="py-1">
								{ordersHref ? <Link to={`${ordersHref}/${number}`}>Order {number}</Link> : `Order ${number}`},{" "}
								{storeName}
								{deliveryOn && `, for ${dayWords(deliveryOn)}`}: {piecesWords(pieces)} of lot {lot}
							</li>
						))}
					</ul>
				</section>
			)}
			{marketDays.length > 0 && (
				<section className="sheet-part" aria-labelledby="sold-at-market">
					<h2 className="head-italic" id="sold-at-market">
						Sold to the public
					</h2>
					<p>Nobody knows who bought these, so no letter can go. Put up a notice at the market.</p>
					<ul>
						{marketDays.map(({ id, marketName, marketOn, lot, sold, onTable }) => (
							<li key={`${id} ${lot}`} className="py-1">
								{marketName}, {fullDay(marketOn)}: {piecesWords(sold)} of lot {lot} sold
								{onTable > 0 && (
									<b className="short">, {piecesWords(onTable)} still on the table: tell the stall to take them off</b>
								)}
							</li>
						))}
					</ul>
				</section>
			)}
		</>
	)
}
