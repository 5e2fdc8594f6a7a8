import { randomUUID } from "node:crypto"
import { data, redirect } from "react-router"
import { findStallPage } from "~/services/stall/find-stall-page.server"
import { takeCard } from "~/services/stall/take-card.server"
import { StallFrame } from "~/ui/layout/stall-frame"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sale"
import { pageOfEarlier } from "./earlier-sale.server"
import { readSale, saleIdIn } from "./sale-in-hand"
import { saleRefusalWords } from "./sale-refusal-words"
import { DayNotOpen, SaleSheet } from "./sale-sheet"
import { dayQuery, notFound } from "./viewer.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `${loaderData?.marketName ?? "Stall"} · Waxbill` },
]

export const loader = guard(admits.stall, async ({ params, url }: Route.LoaderArgs, scope) => {
	const saleId = saleIdIn(url.searchParams)
	const found = await findStallPage({ ...dayQuery(params, scope), saleId })
	if (!found) throw notFound()
	const base = `/stall/${scope.producer.slug}/${params.day}`
	if (found.earlier && saleId) throw redirect(pageOfEarlier(base, saleId, params.day, found.earlier))
	return {
		base,
		listHref: `/stall/${scope.producer.slug}`,
		marketName: found.day.marketName,
		state: found.day.state,
		hasReader: found.day.readerId !== "",
		table: found.table,
		sale: readSale(url.searchParams, randomUUID()),
		done: url.searchParams.get("done"),
	}
})

/** Opens a card sale and puts it on the reader. */
export const action = guard(admits.stall, async ({ params, request }: Route.ActionArgs, scope) => {
	const { saleId, items } = readSale(await request.formData(), randomUUID())
	const taken = await takeCard({ ...dayQuery(params, scope), saleId, items })
	const base = `/stall/${scope.producer.slug}/${params.day}`
	if (taken.ok) return redirect(`${base}/card/${saleId}`)
	switch (taken.reason) {
		case "no-such-day":
			throw notFound()
		case "reader-away":
		case "reader-busy":
			return redirect(`${base}/card/${saleId}?reader=${taken.reason === "reader-busy" ? "busy" : "away"}`)
		case "written-before":
			return redirect(pageOfEarlier(base, saleId, params.day, taken.earlier))
		default:
			return data({ problem: saleRefusalWords(taken), sale: { saleId, items } }, { status: 422 })
	}
})

/** The sale at the stall: the whole row adds one; card or cash at the foot. */
export default function StallSale({ loaderData, actionData }: Route.ComponentProps) {
	const { base, listHref, marketName, state } = loaderData
	if (state !== "open") {
		return (
			<StallFrame title={marketName} back={{ to: listHref, label: "Market days" }}>
				<DayNotOpen state={state} base={base} />
			</StallFrame>
		)
	}
	const sale = actionData?.sale ?? loaderData.sale
	// A new sale starts from its own counts: the id is the key.
	return <SaleSheet key={sale.saleId} stall={loaderData} sale={sale} problem={actionData?.problem} />
}
