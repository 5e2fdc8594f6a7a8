import { Link } from "react-router"
import { dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { findDayTotals } from "~/services/stall/find-stall-page.server"
import { Totals, TotalsRow } from "~/ui/layout/sheet"
import { StallFrame } from "~/ui/layout/stall-frame"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/totals"
import { notFound, viewerOf } from "./viewer.server"

export const meta: Route.MetaFunction = () => [{ title: "The day's totals · Waxbill" }]

export const loader = guard(admits.stall, async ({ params }: Route.LoaderArgs, scope) => {
	const found = await findDayTotals({ producerId: scope.producer.id, dayId: params.day, viewer: viewerOf(scope) })
	if (!found) throw notFound()
	return { base: `/stall/${scope.producer.slug}/${params.day}`, ...found }
})

/** What the day took, and that brought, sold and left agree piece by piece. */
export default function StallTotals({ loaderData }: Route.ComponentProps) {
	const { base, day, table, totals, openSales } = loaderData
	return (
		<StallFrame title="The day's totals" back={{ to: base, label: "Back to the sale" }}>
			<div className="stall-totals">
				<p>
					{day.marketName}, {dayWords(day.on)}
				</p>
				<Totals>
					<TotalsRow label="Cards" value={formatMoney(totals.cardCents)} />
					<TotalsRow label="Cash" value={formatMoney(totals.cashCents)} />
					<TotalsRow
						label="Together"
						note={`${totals.salesCount === 1 ? "1 sale" : `${totals.salesCount} sales`}, ${piecesWords(totals.pieces)}`}
						value={formatMoney(totals.totalCents)}
						weight="sum"
					/>
					<TotalsRow
						label="In the cash box"
						note={`with the float of ${formatMoney(day.floatCents)}`}
						value={formatMoney(totals.expectedCashCents)}
					/>
				</Totals>
				{openSales.map((sale) => (
					<p key={sale.id}>
						<Link to={`${base}/card/${sale.id}`}>A card sale of {formatMoney(sale.totalCents)} is still open</Link>
					</p>
				))}
				<table className="stall-table">
					<caption className="sr-only">Pieces brought, sold and left</caption>
					<thead>
						<tr>
							<th scope="col">Product</th>
							<th scope="col">Brought</th>
							<th scope="col">Sold</th>
							<th scope="col">Left</th>
						</tr>
					</thead>
					<tbody>
						{table.map((item) => (
							<tr key={item.productId}>
								<th scope="row">{item.name}</th>
								<td>{item.loaded}</td>
								<td>{item.sold}</td>
								<td>{item.left}</td>
							</tr>
						))}
					</tbody>
				</table>
			</div>
		</StallFrame>
	)
}
