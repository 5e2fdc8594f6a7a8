import { Link } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { listWithdrawals } from "~/services/withdrawals/list-withdrawals.server"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/withdrawals"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Withdrawals · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const after = url.searchParams.get("after")
	const { withdrawals, next } = await listWithdrawals({ producerId: producer.id, after })
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		after,
		next,
		withdrawals: withdrawals.map(({ startedAt, ...withdrawal }) => ({
			...withdrawal,
			on: fullDay(dayInZone(startedAt, producer.timeZone)),
		})),
	}
})

/** Every withdrawal, the latest first, with how far it has come. */
export default function Withdrawals({ loaderData, params }: Route.ComponentProps) {
	const { withdrawals, after, next } = loaderData
	const desk = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead title="Withdrawals" lead="Lots that were called back. A withdrawal is begun from the page of a lot." />
			{withdrawals.length === 0 ? (
				<EmptyLine action={<Link to={`${desk}/lots`}>All lots</Link>}>
					{after ? "Nothing earlier." : "No lot was ever withdrawn."}
				</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Withdrawal</th>
							<th scope="col">Lots</th>
							<th scope="col" className="max-desk:hidden">
								Why
							</th>
							<th scope="col">Stores</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								Still held
							</th>
						</tr>
					</thead>
					<tbody>
						{withdrawals.map((one) => (
							<tr key={one.number}>
								<td>
									<Link className="name inline-block py-1 text-body!" to={`${desk}/withdrawals/${one.number}`}>
										{one.number}
									</Link>
									<span className="note block">{one.on}</span>
								</td>
								<td>{one.lots.join(", ")}</td>
								<td className="max-desk:hidden">{one.reason}</td>
								<td>
									{one.answered} of {one.stores} answered
									<span className="note block">{one.opened} opened</span>
								</td>
								<td className="num pr-4! desk:pr-8!">{piecesWords(one.heldPieces)}</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier withdrawals" />
		</DeskBook>
	)
}
