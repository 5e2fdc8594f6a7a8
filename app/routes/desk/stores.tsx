import { Link } from "react-router"
import { type Weekday, weekdayName } from "~/domain/calendar"
import { termsWords } from "~/domain/invoicing/terms"
import { formatMoney } from "~/domain/money"
import { type ListedStore, listStores } from "~/services/desk/list-stores.server"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/stores"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Stores · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_args: Route.LoaderArgs, scope) => ({
	frame: await findDeskFrame(scope, { part: "stores" }),
	stores: await listStores({ producerId: scope.producer.id }),
	isOwner: scope.roles.includes("owner"),
}))

/** "$600.00 a delivery; $18.00 for the way, free from $600.00". */
function deliveryWords({ minimumCents, deliveryChargeCents, freeAboveCents }: ListedStore): string {
	const minimum = minimumCents > 0 ? `At least ${formatMoney(minimumCents)}` : "No minimum"
	if (deliveryChargeCents === 0) return `${minimum}; the way is free`
	const free = freeAboveCents === null ? "" : `, free from ${formatMoney(freeAboveCents)}`
	return `${minimum}; ${formatMoney(deliveryChargeCents)} for the way${free}`
}

export default function Stores({ loaderData }: Route.ComponentProps) {
	const { stores, isOwner } = loaderData
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Stores"
				lead="Who buys by the case: their prices, their terms, their days, and who orders."
				action={
					<span className="flex flex-wrap gap-x-5">
						<Link className="py-1" to="../receivables" relative="path">
							Who owes what
						</Link>
						{isOwner && (
							<Link className="py-1" to="new">
								A new store
							</Link>
						)}
					</span>
				}
			/>
			{stores.length === 0 ? (
				<EmptyLine>No store buys from you yet.</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Store</th>
							<th scope="col" className="max-desk:hidden">
								Prices and terms
							</th>
							<th scope="col">Delivered</th>
							<th scope="col" className="max-desk:hidden">
								Who orders
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								Owed
							</th>
						</tr>
					</thead>
					<tbody>
						{stores.map((store) => (
							<tr key={store.name} className={store.isActive ? undefined : "text-ink-faint"}>
								<td className="py-2!">
									<Link className="name block text-body!" to={store.slug}>
										{store.name}
									</Link>
									<span className="note block">{store.address}</span>
									<span className="note block desk:hidden">
										{store.tierName}, {termsWords(store.terms)}
									</span>
									{!store.isActive && <span className="note block">buys no more</span>}
								</td>
								<td className="py-2! max-desk:hidden">
									{store.tierName}, {termsWords(store.terms)}
									<span className="note block">{deliveryWords(store)}</span>
								</td>
								<td className="py-2!">
									{store.weekdays.map((day) => weekdayName(day as Weekday)).join(", ") || "not yet"}
								</td>
								<td className="py-2! max-desk:hidden">
									{store.people.map(({ name, pays }) => (
										<span className="block" key={name}>
											{name}
											{pays && <span className="note">, also pays</span>}
										</span>
									))}
									{store.people.length === 0 && "nobody yet"}
								</td>
								<td className="money pr-4! desk:pr-8!">{store.openCents > 0 ? formatMoney(store.openCents) : ""}</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
		</DeskBook>
	)
}
