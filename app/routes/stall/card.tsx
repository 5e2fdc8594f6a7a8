import { randomUUID } from "node:crypto"
import { useEffect } from "react"
import { data, redirect, useRevalidator } from "react-router"
import { formatMoney } from "~/domain/money"
import { checkSale } from "~/services/stall/check-sale.server"
import { findSalePage } from "~/services/stall/find-stall-page.server"
import { giveUpSale } from "~/services/stall/give-up-sale.server"
import { retryCard } from "~/services/stall/take-card.server"
import { ButtonLink } from "~/ui/forms/button"
import { StallFrame } from "~/ui/layout/stall-frame"
import { CardState } from "~/ui/stall/card-state"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/card"
import { CardWaiting, type Reader } from "./card-waiting"
import { saleQuery } from "./sale-in-hand"
import { dayQuery, idOf, notFound } from "./viewer.server"

/** How often the page looks whether the card has gone through. */
const LOOK_EVERY_MS = 1_500

export const meta: Route.MetaFunction = () => [{ title: "Card · Waxbill" }]

export const loader = guard(admits.stall, async ({ params, url }: Route.LoaderArgs, scope) => {
	const found = await findSalePage({ ...dayQuery(params, scope), saleId: idOf(params.sale) })
	if (!found) throw notFound()
	const { sale } = found
	return {
		base: `/stall/${scope.producer.slug}/${params.day}`,
		sale,
		reader: sale.hasPayment ? readerIn(url.searchParams) : ("away" as const),
	}
})

export const action = guard(admits.stall, async ({ params, request }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const query = { ...dayQuery(params, scope), saleId: idOf(params.sale) }
	const base = `/stall/${scope.producer.slug}/${params.day}`
	const here = `${base}/card/${params.sale}`
	const noAnswer = (words: string) => data({ problem: words }, { status: 503 })
	switch (form.get("intent")) {
		case "again": {
			const asked = await retryCard({ ...query, after: Number(form.get("attempt")) })
			if (asked.ok) return redirect(here)
			if (asked.reason === "no-such-sale") throw notFound()
			return redirect(`${here}?reader=${asked.reason === "reader-busy" ? "busy" : "away"}`)
		}
		case "look": {
			const found = await checkSale(query)
			if (found === "no-answer") return noAnswer("No answer about this card yet. It is not charged twice; look again.")
			return redirect(found === "off-reader" ? `${here}?reader=off` : here)
		}
		case "give-up":
		case "cash": {
			const given = await giveUpSale(query)
			if (given.ok) {
				const sale = saleQuery({ saleId: randomUUID(), items: given.items })
				return redirect(form.get("intent") === "cash" ? `${base}/cash?${sale}` : `${base}?${sale}`)
			}
			if (given.reason === "no-such-sale") throw notFound()
			if (given.reason === "already-paid") return redirect(here)
			return noAnswer("No answer from the card service, so the sale is kept. Try again.")
		}
		default:
			throw new Response(null, { status: 400 })
	}
})

/** A card sale on the reader: waiting, paid, or declined in words with the ways on. */
export default function StallCard({ loaderData, actionData }: Route.ComponentProps) {
	const { base, sale, reader } = loaderData
	useLookAgain(sale.state === "open")
	const figure = formatMoney(sale.totalCents)
	return (
		<StallFrame title="Card">
			{sale.state === "open" ? (
				<CardWaiting
					figure={figure}
					attempt={sale.attempt}
					declined={sale.declineMessage}
					reader={reader}
					problem={actionData?.problem}
					totalsHref={`${base}/totals`}
				/>
			) : (
				<>
					{sale.state === "paid" ? (
						<CardState icon="tick" words="Paid by card" figure={figure} />
					) : (
						<CardState icon="cross" words="Given up. Nothing was charged of" figure={figure} />
					)}
					<div className="stall-done">
						<ButtonLink variant="primary" to={base}>
							Next sale
						</ButtonLink>
					</div>
				</>
			)}
		</StallFrame>
	)
}

/** What the step before found of the reader, as the address has it. */
function readerIn(query: URLSearchParams): Reader {
	const found = query.get("reader")
	return found === "away" || found === "busy" || found === "off" ? found : "asks"
}

function useLookAgain(isOpen: boolean): void {
	const { revalidate } = useRevalidator()
	useEffect(() => {
		if (!isOpen) return
		const timer = setInterval(() => document.visibilityState === "visible" && revalidate(), LOOK_EVERY_MS)
		return () => clearInterval(timer)
	}, [isOpen, revalidate])
}
