import { data } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { findWithdrawal } from "~/services/withdrawals/find-withdrawal.server"
import { SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/withdrawal-poster"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Notice of withdrawal ${params.number} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	if (!/^[1-9]\d{0,8}$/.test(params.number)) throw data(null, { status: 404 })
	const query = { producerId: producer.id, number: Number(params.number), filter: "all", after: null } as const
	const withdrawal = await findWithdrawal(query)
	if (!withdrawal) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		yardName: producer.name,
		on: fullDay(dayInZone(withdrawal.startedAt, producer.timeZone)),
		reason: withdrawal.reason,
		instructions: withdrawal.instructions,
		lots: withdrawal.lots,
		marketDays: withdrawal.marketDays.filter(({ sold }) => sold > 0),
	}
})

/** A notice for the stall and the farm gate, for those whom no letter reaches. The browser prints it. */
export default function WithdrawalPoster({ loaderData }: Route.ComponentProps) {
	const { yardName, on, reason, instructions, lots, marketDays } = loaderData
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={`Please do not eat comb of ${lots.length === 1 ? "this lot" : "these lots"}`}
				lead={`${yardName}, ${on}. The lot is printed on the label.`}
			/>
			<div className="sheet-part poster">
				<ul>
					{lots.map((lot) => (
						<li key={lot.code}>
							<b>Lot {lot.code}</b>, {lot.productName}
						</li>
					))}
				</ul>
				<p>{reason}</p>
				<p>
					<b>What to do.</b> {instructions}
				</p>
				{marketDays.length > 0 && (
					<p>
						It was sold at{" "}
						{[...new Set(marketDays.map((day) => `${day.marketName} on ${fullDay(day.marketOn)}`))].join(", ")}.
					</p>
				)}
			</div>
			<p className="note no-print px-4 desk:px-8">Print this page from your browser and put it up at the stall.</p>
		</DeskBook>
	)
}
