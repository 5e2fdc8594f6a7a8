import { Link } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { formatMoney, plainMoney } from "~/domain/money"
import { weightWords } from "~/domain/weight"
import { now } from "~/platform/clock.server"
import { findPriceList } from "~/services/desk/find-price-list.server"
import { ButtonLink } from "~/ui/forms/button"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/prices"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Prices · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const at = now()
	const products = await findPriceList({ producerId: producer.id, today: dayInZone(at, producer.timeZone) })
	return {
		frame: await findDeskFrame(scope, { part: "prices", now: at }),
		products,
		wasSet: url.searchParams.has("set"),
		tiers: [...new Map(products.flatMap(({ tiers }) => tiers.map((tier) => [tier.tierName, tier.tierId])))]
			.map(([name, id]) => ({ name, id }))
			.toSorted((a, b) => a.name.localeCompare(b.name)),
	}
})

type Break = { minCases: number; caseCents: number }

function Breaks({ breaks }: { breaks: readonly Break[] }) {
	return (
		<span className="breaks">
			{breaks.map(({ minCases, caseCents }, index) => (
				<span key={minCases} className={index === 0 ? "block" : "block text-ink-soft"}>
					{index > 0 && <span className="note">from {minCases} </span>}
					{plainMoney(caseCents)}
				</span>
			))}
		</span>
	)
}

/** Files, not pages: the browser takes them. */
function TierFiles({ page, tier }: { page: string; tier: { id: string; name: string } }) {
	return (
		<>
			<a href={`${page}/${tier.id}.pdf`} aria-label={`Prices for ${tier.name}, to print`}>
				print
			</a>{" "}
			<a href={`${page}/${tier.id}.csv`} aria-label={`Prices for ${tier.name}, for a spreadsheet`}>
				CSV
			</a>
		</>
	)
}

export default function Prices({ loaderData, params }: Route.ComponentProps) {
	const { products, tiers, wasSet } = loaderData
	const page = `/desk/${params.producer}/prices`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Prices"
				lead="What a case costs in each price tier, and from how many cases of its family it costs less."
				action={
					<div className="flex flex-wrap items-center gap-3">
						<Link to={`${page}/special`}>Own prices and promotions</Link>
						<Link to={`${page}/upload`}>Upload a list</Link>
						<ButtonLink variant="primary" to={`${page}/new`}>
							Set a price
						</ButtonLink>
					</div>
				}
			/>
			{wasSet && <MessageLine tone="saved" title="Kept." />}
			{products.length === 0 ? (
				<EmptyLine>Nothing is for sale yet.</EmptyLine>
			) : (
				// biome-ignore lint/a11y/noNoninteractiveTabindex: a table wider than the screen is scrolled by keyboard too
				<section className="overflow-x-auto" aria-label="Price list" tabIndex={0}>
					<table className="sheet-table price-list stacked-rows">
						<thead>
							<tr>
								<th scope="col">No.</th>
								<th scope="col">Product</th>
								<th scope="col" className="max-desk:hidden">
									A case
								</th>
								{tiers.map((tier) => (
									<th key={tier.id} scope="col" className="num">
										{tier.name}
										<span className="note block">
											<TierFiles page={page} tier={tier} />
										</span>
									</th>
								))}
								<th scope="col" className="num pr-4! desk:pr-8!">
									One piece, to the public
								</th>
							</tr>
						</thead>
						<tbody>
							{products.map((product) => (
								<tr key={product.code}>
									<td className="fig text-ink-faint max-desk:hidden">{product.code}</td>
									<td className="desk:min-w-44 desk:py-2!">
										<span className="name block text-body!">
											<span className="fig text-ink-faint desk:hidden">{product.code} </span>
											{product.name}
										</span>
										<span className="note">{product.detail}</span>
									</td>
									<td className="max-desk:hidden">
										{product.piecesPerCase} pieces
										<span className="note block">{weightWords(product.pieceNetGrams * product.piecesPerCase)} net</span>
									</td>
									{tiers.map((tier) => (
										<td key={tier.id} className="of-tier money desk:py-2!">
											<span className="note desk:hidden">{tier.name}</span>
											<Breaks breaks={product.tiers.find((one) => one.tierId === tier.id)?.breaks ?? []} />
										</td>
									))}
									<td className="of-tier money desk:pr-8!">
										<span className="note desk:hidden">One piece, to the public</span>
										{product.pieceCents === null ? "not sold singly" : formatMoney(product.pieceCents)}
									</td>
								</tr>
							))}
						</tbody>
					</table>
					<ul className="grid gap-2 px-4 py-4 desk:hidden">
						{tiers.map((tier) => (
							<li key={tier.id}>
								{tier.name}: <TierFiles page={page} tier={tier} />
							</li>
						))}
					</ul>
				</section>
			)}
		</DeskBook>
	)
}
