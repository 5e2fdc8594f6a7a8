import { dayInZone, fullDay } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { weightWords } from "~/domain/weight"
import { now as askClock } from "~/platform/clock.server"
import { findStoreList } from "~/services/pricing/find-priced-list.server"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/prices"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Our prices · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async (_args: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const now = askClock()
	const day = dayInZone(now, producer.timeZone)
	const list = await findStoreList({ producerId: producer.id, store, day })
	return { frame: await findBuyFrame(scope, { part: "details", now }), day, products: list?.products ?? [] }
})

export default function OurPrices({ loaderData, params }: Route.ComponentProps) {
	const { products, day } = loaderData
	const page = `/buy/${params.producer}/${params.store}/prices`
	return (
		<BuyBook frame={loaderData.frame}>
			<SheetHead
				title="Our prices"
				lead={`What a case costs you on ${fullDay(day)}, and from how many cases of its family it costs less.`}
				action={
					<div className="flex flex-wrap gap-3">
						{/* Files, not pages: the browser takes them. */}
						<a href={`${page}.pdf`}>To print</a>
						<a href={`${page}.csv`}>For a spreadsheet</a>
					</div>
				}
			/>
			{products.length === 0 ? (
				<EmptyLine>Nothing is for sale yet.</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">No.</th>
							<th scope="col">Product</th>
							<th scope="col" className="max-desk:hidden">
								A case holds
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								A case
							</th>
						</tr>
					</thead>
					<tbody>
						{products.map(({ code, name, detail, piecesPerCase, pieceNetGrams, breaks }) => (
							<tr key={code}>
								<td className="fig text-ink-faint">{code}</td>
								<td className="py-2!">
									<span className="name block text-body!">{name}</span>
									<span className="note">{detail}</span>
								</td>
								<td className="max-desk:hidden">
									{piecesPerCase} pieces
									<span className="note block">{weightWords(pieceNetGrams * piecesPerCase)} net</span>
								</td>
								<td className="money py-2! pr-4! desk:pr-8!">
									{breaks.map(({ minCases, caseCents }, index) => (
										<span key={minCases} className={index === 0 ? "block" : "block text-ink-soft"}>
											{index > 0 && <span className="note">from {minCases} </span>}
											{plainMoney(caseCents)}
										</span>
									))}
								</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
		</BuyBook>
	)
}
