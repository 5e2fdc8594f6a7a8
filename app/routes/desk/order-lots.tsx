import { data, Link } from "react-router"
import { dayWords } from "~/domain/calendar"
import { findOrderTrace } from "~/services/trace/find-backward-trace.server"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { LotHistories } from "~/ui/trace/lot-history"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/order-lots"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Lots of order ${params.number} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	if (!/^[1-9]\d{0,8}$/.test(params.number)) throw data(null, { status: 404 })
	const query = { producerId: producer.id, zone: producer.timeZone, number: Number(params.number) }
	const order = await findOrderTrace(query)
	if (!order) throw data(null, { status: 404 })
	return { frame: await findDeskFrame(scope, { part: "orders", day: order.deliveryOn }), order }
})

/** The lots of an order, and where each of them comes from. */
export default function OrderLots({ loaderData, params }: Route.ComponentProps) {
	const { order } = loaderData
	const desk = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={`Lots of order ${params.number}`}
				lead={
					<>
						{order.storeName}, for {dayWords(order.deliveryOn)}, {order.state}.{" "}
						<Link to={`${desk}/orders/${params.number}`}>Back to the order</Link>
					</>
				}
			/>
			{order.packed.length === 0 ? (
				<EmptyLine>It is not packed yet. Which lots fill it is settled when it is.</EmptyLine>
			) : (
				<>
					<table className="sheet-table">
						<thead>
							<tr>
								<th scope="col">Product</th>
								<th scope="col">Lot</th>
								<th scope="col" className="num pr-4! desk:pr-8!">
									Pieces
								</th>
							</tr>
						</thead>
						<tbody>
							{order.packed.map((row) => (
								<tr key={`${row.productName} ${row.lot}`}>
									<td>{row.productName}</td>
									<td>
										<Link className="inline-block py-1" to={`${desk}/lots/${encodeURIComponent(row.lot)}`}>
											{row.lot}
										</Link>
									</td>
									<td className="num fig pr-4! desk:pr-8!">{row.pieces}</td>
								</tr>
							))}
						</tbody>
					</table>
					<h2 className="head-italic px-4 pt-6 desk:px-8">Where they come from</h2>
					<LotHistories lots={order.lots} links={order.links} lotsHref={`${desk}/lots`} />
				</>
			)}
		</DeskBook>
	)
}
