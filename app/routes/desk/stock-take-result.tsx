import { data, Link } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords, timeWords } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { findStockTake } from "~/services/stock/find-stock-take.server"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { postedMoreWords } from "~/ui/stock/difference-words"
import { countedPlaceName } from "~/ui/stock/where-words"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/stock-take-result"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Stock-take · Waxbill" }]

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const takeId = z.guid().safeParse(params.take)
		const zone = scope.producer.timeZone
		const take = takeId.success
			? await findStockTake({ producerId: scope.producer.id, takeId: takeId.data.toLowerCase() })
			: null
		if (!take) throw data(null, { status: 404 })
		const { postedAt, place, of, ...facts } = take
		return {
			frame: await findDeskFrame(scope, { part: "lots" }),
			take: facts,
			name: countedPlaceName(place, of),
			when: `${dayWords(dayInZone(postedAt, zone))}, ${timeWords(postedAt, zone)}`,
			isNew: url.searchParams.has("posted"),
		}
	},
)

export default function StockTakeResult({ loaderData, params }: Route.ComponentProps) {
	const { take, name, when, isNew } = loaderData
	const base = `/desk/${params.producer}`
	const differing = take.lines.filter((line) => line.counted !== line.ledger).length
	return (
		<DeskBook frame={loaderData.frame}>
			{isNew && (
				<MessageLine tone="saved" title="The count is posted.">
					{differing === 0 ? "Nothing differed." : "What differed is moved, with its reason."}
				</MessageLine>
			)}
			<SheetHead
				title={`Count of ${name}`}
				lead={
					<>
						{when}
						{take.who && `, by ${take.who}`}. {take.lots === 1 ? "One lot" : `${take.lots} lots`} counted,{" "}
						{differing === 0 ? "none differed" : differing === 1 ? "one differed" : `${differing} differed`}.{" "}
						<Link className="no-print" to={`${base}/stock-takes`}>
							All counts
						</Link>
					</>
				}
			/>
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col">Lot</th>
						<th scope="col">Product</th>
						<th scope="col" className="num max-desk:hidden">
							In the ledger
						</th>
						<th scope="col" className="num">
							Counted
						</th>
						<th scope="col" className="pl-4! pr-4! desk:pr-8!">
							Posted
						</th>
					</tr>
				</thead>
				<tbody>
					{take.lines.map((line) => (
						<tr key={line.code}>
							<td>
								<Link
									className="fig inline-block py-1 whitespace-nowrap"
									to={`${base}/lots/${encodeURIComponent(line.code)}`}
								>
									{line.code}
								</Link>
							</td>
							<td>
								{line.productName}
								<span className="note block">{line.detail}</span>
							</td>
							<td className="num fig max-desk:hidden">{line.ledger}</td>
							<td className="num fig">
								{line.counted}
								<span className="note block desk:hidden">of {line.ledger}</span>
							</td>
							<td className="pl-4! pr-4! desk:pr-8!">
								{line.counted === line.ledger
									? "agreed"
									: line.counted < line.ledger
										? `${piecesWords(line.ledger - line.counted)} missing`
										: postedMoreWords(line)}
								{line.reason && <span className="note block">{line.reason}</span>}
							</td>
						</tr>
					))}
				</tbody>
			</table>
		</DeskBook>
	)
}
