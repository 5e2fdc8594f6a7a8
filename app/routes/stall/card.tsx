import { useEffect } from "react"
import { data, Form, redirect, useNavigation, useRevalidator } from "react-router"
import { z } from "zod"
import { formatMoney } from "~/domain/money"
import { checkSale } from "~/services/stall/check-sale.server"
import { findSalePage } from "~/services/stall/find-stall-page.server"
import { giveUpSale } from "~/services/stall/give-up-sale.server"
import { retryCard } from "~/services/stall/take-card.server"
import { Button, ButtonLink } from "~/ui/forms/button"
import { MessageLine } from "~/ui/layout/sheet"
import { StallFrame } from "~/ui/layout/stall-frame"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/card"
import { notFound, viewerOf } from "./viewer.server"

/** How often the page looks whether the card has gone through. */
const LOOK_EVERY_MS = 1_500

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: "Card · Waxbill" },
	// Without script the page looks again by itself; with it, the effect below is quicker.
	...(loaderData?.sale.state === "open" && !loaderData.sale.declineMessage
		? [{ tagName: "meta", httpEquiv: "refresh", content: "4" }]
		: []),
]

export const loader = guard(admits.stall, async ({ params, url }: Route.LoaderArgs, scope) => {
	const found = await findSalePage({
		producerId: scope.producer.id,
		dayId: params.day,
		viewer: viewerOf(scope),
		saleId: isId(params.sale),
	})
	if (!found) throw notFound()
	return {
		base: `/stall/${scope.producer.slug}/${params.day}`,
		sale: found.sale,
		isReaderAway: url.searchParams.has("away") || !found.sale.isAtReader,
	}
})

export const action = guard(admits.stall, async ({ params, request }: Route.ActionArgs, scope) => {
	const intent = (await request.formData()).get("intent")
	const base = `/stall/${scope.producer.slug}/${params.day}`
	const query = { producerId: scope.producer.id, dayId: params.day, viewer: viewerOf(scope), saleId: isId(params.sale) }
	if (intent === "again") {
		const asked = await retryCard(query)
		if (asked.ok) return redirect(`${base}/card/${params.sale}`)
		if (asked.reason !== "reader-away") throw notFound()
		return data({ problem: "The card reader does not answer. Nothing was charged." }, { status: 503 })
	}
	if (intent === "look") {
		const isKnown = await checkSale(query)
		if (isKnown) return redirect(`${base}/card/${params.sale}`)
		return data({ problem: "No answer about this card yet. It is not charged twice; look again." }, { status: 503 })
	}
	if (intent !== "give-up") throw new Response(null, { status: 400 })
	const given = await giveUpSale(query)
	if (given.ok)
		return redirect(`${base}?${new URLSearchParams({ done: "Card sale given up; the pieces are back on the table." })}`)
	if (given.reason === "no-such-sale") throw notFound()
	if (given.reason === "already-paid") return redirect(`${base}/card/${params.sale}`)
	return data({ problem: "No answer from the card service, so the sale is kept. Try again." }, { status: 503 })
})

/** A card sale on the reader: waiting, paid, or declined in words with the ways on. */
export default function StallCard({ loaderData, actionData }: Route.ComponentProps) {
	const { base, sale, isReaderAway } = loaderData
	const isWaiting = sale.state === "open" && !sale.declineMessage && !isReaderAway
	useLookAgain(isWaiting)
	const busy = useNavigation().formMethod === "POST"
	const figure = formatMoney(sale.totalCents)
	if (sale.state !== "open") {
		return (
			<StallFrame title="Card" figure={figure}>
				{sale.state === "paid" ? (
					<MessageLine tone="saved" title={`Paid: ${figure} by card.`} />
				) : (
					<p className="p-4 text-figure">This sale was given up. Nothing was charged.</p>
				)}
				<div className="cash-done">
					<ButtonLink variant="primary" to={base}>
						Next sale
					</ButtonLink>
				</div>
			</StallFrame>
		)
	}
	return (
		<StallFrame title="Card" figure={figure}>
			{actionData && <MessageLine tone="problem" title={actionData.problem} />}
			{sale.declineMessage && (
				<MessageLine tone="problem" title="The card was refused.">
					{sale.declineMessage} Nothing was charged; the sale is still open.
				</MessageLine>
			)}
			{isReaderAway && !actionData && !sale.declineMessage && (
				<MessageLine tone="problem" title="The card reader does not answer.">
					Nothing was charged. See that it is on, then try again.
				</MessageLine>
			)}
			{isWaiting && (
				<p className="p-4 text-figure" role="status">
					Hold out the reader: it asks for {figure}. This page changes when the card has gone through.
				</p>
			)}
			<Form method="post" className="cash-done">
				{isWaiting ? (
					<Button name="intent" value="look" busy={busy}>
						Look again
					</Button>
				) : (
					<Button variant="primary" name="intent" value="again" busy={busy}>
						Try the card again
					</Button>
				)}
				<Button name="intent" value="give-up" busy={busy}>
					Give up this sale
				</Button>
			</Form>
		</StallFrame>
	)
}

function useLookAgain(isWaiting: boolean): void {
	const { revalidate } = useRevalidator()
	useEffect(() => {
		if (!isWaiting) return
		const timer = setInterval(() => document.visibilityState === "visible" && revalidate(), LOOK_EVERY_MS)
		return () => clearInterval(timer)
	}, [isWaiting, revalidate])
}

/** The id in the address, or 404: the database takes nothing else. */
function isId(text: string): string {
	if (!z.uuid().safeParse(text).success) throw notFound()
	return text
}
