import { Link } from "react-router"
import { dayWords } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { findDayTotals } from "~/services/stall/find-day-totals.server"
import { MessageLine, Totals, TotalsRow } from "~/ui/layout/sheet"
import { StallFrame } from "~/ui/layout/stall-frame"
import { PiecesTable } from "~/ui/stall/pieces-table"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/totals"
import { dayQuery, notFound } from "./viewer.server"

export const meta: Route.MetaFunction = () => [{ title: "The day's totals · Waxbill" }]

export const loader = guard(admits.stall, async ({ params }: Route.LoaderArgs, scope) => {
	const found = await findDayTotals(dayQuery(params, scope))
	if (!found) throw notFound()
	return { base: `/stall/${scope.producer.slug}/${params.day}`, ...found }
})

/** What the day took, and that brought, sold and left agree piece by piece. */
export default function StallTotals({ loaderData }: Route.ComponentProps) {
	const { base, day, pieces, totals, openSales } = loaderData
	const sales = totals.salesCount === 1 ? "1 sale" : `${totals.salesCount} sales`
	const wrong = pieces.filter(({ agrees }) => !agrees).map(({ name }) => name)
	return (
		<StallFrame title="The day's totals" back={{ to: base, label: "Back to the sale" }}>
			{wrong.length > 0 && (
				<MessageLine tone="problem" title="Brought, sold and left do not agree:">
					{wrong.join(", ")}. Tell the yard.
				</MessageLine>
			)}
			<div className="stall-totals">
				<p>
					{day.marketName}, {dayWords(day.on)}
				</p>
				<Totals>
					<TotalsRow label="By card" value={formatMoney(totals.cardCents)} />
					<TotalsRow label="In cash" value={formatMoney(totals.cashCents)} />
					<TotalsRow
						label="Together"
						note={`${sales}, ${piecesWords(totals.pieces)}`}
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
					<Link key={sale.id} to={`${base}/card/${sale.id}`}>
						A card sale of {formatMoney(sale.totalCents)} is still open, {piecesWords(sale.pieces)}
					</Link>
				))}
				{pieces.length === 0 ? (
					<p>Nothing was brought.</p>
				) : (
					<PiecesTable
						rows={pieces}
						verdict={wrong.length === 0 ? "Brought, sold and left agree, piece by piece." : null}
					/>
				)}
			</div>
		</StallFrame>
	)
}
