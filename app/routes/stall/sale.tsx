import { randomUUID } from "node:crypto"
import { useState } from "react"
import { data, Form, Link, redirect, useNavigation } from "react-router"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import { findStallPage } from "~/services/stall/find-stall-page.server"
import { takeCard } from "~/services/stall/take-card.server"
import { Button } from "~/ui/forms/button"
import { MessageLine } from "~/ui/layout/sheet"
import { StallFrame } from "~/ui/layout/stall-frame"
import { PIECE_OF_FORM } from "~/ui/stall/piece-of-form"
import { StallItem } from "~/ui/stall/stall-item"
import { StallPay } from "~/ui/stall/stall-pay"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sale"
import { readSale, type SaleInHand } from "./sale-in-hand"
import { saleRefusalWords } from "./sale-refusal-words"
import { useSignal } from "./use-signal"
import { notFound, viewerOf } from "./viewer.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `${loaderData?.marketName ?? "Stall"} · Waxbill` },
]

export const loader = guard(admits.stall, async ({ params, url }: Route.LoaderArgs, scope) => {
	const found = await findStallPage({ producerId: scope.producer.id, dayId: params.day, viewer: viewerOf(scope) })
	if (!found) throw notFound()
	return {
		base: `/stall/${scope.producer.slug}/${params.day}`,
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
	const taken = await takeCard({
		producerId: scope.producer.id,
		dayId: params.day,
		viewer: viewerOf(scope),
		saleId,
		items,
	})
	if (taken.ok || taken.reason === "reader-away") {
		const away = taken.ok ? "" : "?away=1"
		return redirect(`/stall/${scope.producer.slug}/${params.day}/card/${saleId}${away}`)
	}
	const problem = saleRefusalWords(taken)
	if (problem === null) throw notFound()
	return data({ problem, sale: { saleId, items } }, { status: 422 })
})

/** The sale at the stall: the whole row adds one; card or cash at the foot. */
export default function StallSale({ loaderData, actionData }: Route.ComponentProps) {
	const { sale } = actionData ?? loaderData
	// A new sale starts from its own counts: the id is the key.
	return <SaleSheet key={sale.saleId} loaderData={loaderData} sale={sale} problem={actionData?.problem} />
}

type SheetProps = Pick<Route.ComponentProps, "loaderData"> & { sale: SaleInHand; problem: string | undefined }

function SaleSheet({ loaderData, sale, problem }: SheetProps) {
	const { base, listHref, marketName, state, hasReader, table, done } = loaderData
	const [counts, setCounts] = useState(() => new Map(sale.items.map((item) => [item.productId, item.pieces])))
	const navigation = useNavigation()
	const hasSignal = useSignal()
	const rows = table.map((item) => {
		const inSale = Math.min(counts.get(item.productId) ?? 0, item.left)
		return { ...item, inSale }
	})
	const pieces = rows.reduce((sum, row) => sum + row.inSale, 0)
	const totalCents = rows.reduce((sum, row) => sum + row.inSale * row.pieceCents, 0)
	/** Counts here and at once; before the page is awake, the button sends the form, which counts on the server. */
	const step = (productId: string, by: number) => ({
		name: by > 0 ? "add" : "fewer",
		value: productId,
		onClick: (event: { preventDefault: () => void }) => {
			event.preventDefault()
			setCounts((before) => new Map(before).set(productId, Math.max(0, (before.get(productId) ?? 0) + by)))
		},
	})
	const isTaking = navigation.state !== "idle" && navigation.formMethod === "POST"
	if (state !== "open") {
		return (
			<StallFrame title={marketName} back={{ to: listHref, label: "Market days" }}>
				<p className="p-4 text-figure">
					{state === "planned" ? "This market day is not loaded yet." : "This market day is closed."}
				</p>
				<p className="p-4 pt-0">
					<Link to={`${base}/totals`}>The day's totals</Link>
				</p>
			</StallFrame>
		)
	}
	return (
		<StallFrame
			title={marketName}
			back={{ to: listHref, label: "Market days" }}
			signal={hasSignal ? undefined : { state: "none", text: "No signal: cash and card wait until it is back" }}
		>
			{problem && <MessageLine tone="problem" title={problem} />}
			{done && !problem && pieces === 0 && <MessageLine tone="saved" title={done} />}
			<Form method="get" action={base}>
				<input type="hidden" name="sale" value={sale.saleId} />
				{rows.map((row) => (
					<input key={row.productId} type="hidden" name={`n-${row.productId}`} value={row.inSale} />
				))}
				{rows.length === 0 && <p className="p-4 text-figure">Nothing was loaded for this day.</p>}
				{rows.map((row) => (
					<StallItem
						key={row.productId}
						piece={PIECE_OF_FORM[row.form]}
						name={row.name}
						price={formatMoney(row.pieceCents)}
						left={row.left - row.inSale}
						inSale={row.inSale}
						add={step(row.productId, 1)}
						fewer={step(row.productId, -1)}
					/>
				))}
				<StallPay
					total={formatMoney(totalCents)}
					ways={
						<>
							<Button formAction={`${base}/cash`} icon="cash" iconSize={26} disabled={pieces === 0}>
								Take cash
							</Button>
							<Button
								variant="primary"
								icon="card"
								iconSize={26}
								formMethod="post"
								formAction={base}
								busy={isTaking}
								disabled={pieces === 0 || !hasReader || !hasSignal}
								disabledReason={hasSignal ? (hasReader ? undefined : "no reader for this market") : "card needs signal"}
							>
								Take card
							</Button>
						</>
					}
				>
					<p>{piecesWords(pieces)}</p>
					{pieces > 0 ? <Link to={base}>Start again</Link> : <Link to={`${base}/totals`}>The day's totals</Link>}
				</StallPay>
			</Form>
		</StallFrame>
	)
}
