import { Link } from "react-router"
import { dayInZone, dayWords, timeWords } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { listStockTakes } from "~/services/stock/find-stock-take.server"
import { ListPages } from "~/ui/desk/list-pages"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { countedPlaceName } from "~/ui/stock/where-words"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/stock-takes"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Stock-takes · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const after = url.searchParams.get("after")
	const { takes, next } = await listStockTakes({ producerId: scope.producer.id, after })
	const zone = scope.producer.timeZone
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		after,
		next,
		takes: takes.map(({ postedAt, place, of, ...take }) => ({
			...take,
			name: countedPlaceName(place, of),
			when: `${dayWords(dayInZone(postedAt, zone))}, ${timeWords(postedAt, zone)}`,
		})),
	}
})

function netWords(net: number): string {
	if (net === 0) return "as many in all"
	return net < 0 ? `${piecesWords(-net)} fewer` : `${piecesWords(net)} more`
}

export default function StockTakes({ loaderData, params }: Route.ComponentProps) {
	const { takes, next, after } = loaderData
	const base = `/desk/${params.producer}/stock-take`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Stock-takes"
				lead={
					<>
						What was counted against the ledger, the latest first. <Link to={base}>Count a place</Link>
					</>
				}
			/>
			{takes.length === 0 ? (
				<EmptyLine action={<Link to={base}>Count a place</Link>}>
					{after ? "Nothing earlier." : "No place has been counted yet."}
				</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">When</th>
							<th scope="col">Place</th>
							<th scope="col" className="max-desk:hidden">
								Who
							</th>
							<th scope="col" className="num">
								Lots
							</th>
							<th scope="col" className="pr-4! desk:pr-8!">
								Differed
							</th>
						</tr>
					</thead>
					<tbody>
						{takes.map((take) => (
							<tr key={take.id}>
								<td>
									<Link className="inline-block py-1" to={`${base}/${take.id}`}>
										{take.when}
									</Link>
								</td>
								<td>
									<span className="inline-block first-letter:uppercase">{take.name}</span>
								</td>
								<td className="max-desk:hidden">{take.who ?? "by itself"}</td>
								<td className="num fig">{take.lots}</td>
								<td className="pr-4! desk:pr-8!">
									{take.differing === 0 ? (
										"nothing"
									) : (
										<>
											{take.differing === 1 ? "1 lot" : `${take.differing} lots`}
											<span className="note block">{netWords(take.net)}</span>
										</>
									)}
								</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
			<ListPages params={after ? { after } : {}} next={next} laterWords="Earlier counts" />
		</DeskBook>
	)
}
