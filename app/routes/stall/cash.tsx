import { randomUUID } from "node:crypto"
import { data, Form, redirect, useNavigation } from "react-router"
import { formatMoney, plainMoney } from "~/domain/money"
import { changeFor, likelyAmounts } from "~/domain/stall/change"
import { saleTotals } from "~/domain/stall/sale-totals"
import { findStallPage } from "~/services/stall/find-stall-page.server"
import { takeCash } from "~/services/stall/take-cash.server"
import { Button } from "~/ui/forms/button"
import { MessageLine } from "~/ui/layout/sheet"
import { StallFrame } from "~/ui/layout/stall-frame"
import { GiveBack } from "~/ui/stall/stall-pay"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/cash"
import { CashGiven, SaleFields } from "./cash-given"
import { pageOfEarlier } from "./earlier-sale.server"
import { parseGiven } from "./parse-given"
import { readSale, saleQuery } from "./sale-in-hand"
import { saleRefusalWords } from "./sale-refusal-words"
import { dayQuery, notFound } from "./viewer.server"

export const meta: Route.MetaFunction = () => [{ title: "Cash · Waxbill" }]

export const loader = guard(admits.stall, async ({ params, url }: Route.LoaderArgs, scope) => {
	const sale = readSale(url.searchParams, randomUUID())
	const found = await findStallPage({ ...dayQuery(params, scope), saleId: sale.saleId })
	if (!found) throw notFound()
	const base = `/stall/${scope.producer.slug}/${params.day}`
	if (found.earlier) throw redirect(pageOfEarlier(base, sale.saleId, params.day, found.earlier))
	const prices = new Map(found.table.map((item) => [item.productId, item.pieceCents]))
	const lines = sale.items.map((item) => ({ ...item, pieceCents: prices.get(item.productId) ?? 0 }))
	const { totalCents } = saleTotals(lines)
	if (totalCents === 0) throw redirect(base)
	const other = url.searchParams.get("other")
	const typed = url.searchParams.get("given") ?? other ?? ""
	return { base, sale, totalCents, likely: likelyAmounts(totalCents), isOther: other !== null, typed }
})

/** Writes the sale: the money is in the box and the change is given back. */
export const action = guard(admits.stall, async ({ params, request }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const { saleId, items } = readSale(form, randomUUID())
	const given = parseGiven(String(form.get("given") ?? ""))
	if (!given.ok) return data({ problem: "Say first what they gave you." }, { status: 422 })
	const taken = await takeCash({ ...dayQuery(params, scope), saleId, items, givenCents: given.cents })
	const base = `/stall/${scope.producer.slug}/${params.day}`
	if (taken.ok) {
		return redirect(`${base}?${new URLSearchParams({ done: `Sold for ${formatMoney(taken.totalCents)} in cash.` })}`)
	}
	switch (taken.reason) {
		case "no-such-day":
			throw notFound()
		case "written-before":
			return redirect(pageOfEarlier(base, saleId, params.day, taken.earlier))
		default:
			return data({ problem: saleRefusalWords(taken) }, { status: 422 })
	}
})

/** What did they give you, and what to give back. */
export default function StallCash({ loaderData, actionData }: Route.ComponentProps) {
	const { base, sale, totalCents, likely, isOther, typed } = loaderData
	const isSaving = useNavigation().formMethod === "POST"
	const given = parseGiven(typed)
	const change = given.ok ? changeFor({ dueCents: totalCents, givenCents: given.cents }) : null
	return (
		<StallFrame
			title="Cash"
			back={{ to: `${base}?${saleQuery(sale)}`, label: "Back to the sale" }}
			figure={formatMoney(totalCents)}
		>
			{actionData && <MessageLine tone="problem" title={actionData.problem} />}
			<CashGiven sale={sale} totalCents={totalCents} likely={likely} isOther={isOther} typed={typed} />
			{change?.ok && (
				<GiveBack
					total={formatMoney(change.changeCents)}
					pieces={change.parts.map((part) => ({ ...part, amount: plainMoney(part.sumCents) }))}
					message={change.changeCents === 0 ? "Nothing to give back." : undefined}
				/>
			)}
			{change?.ok === false && <GiveBack label="Ask for" total={change.words} pieces={[]} />}
			<Form method="post" className="stall-done">
				<SaleFields sale={sale} />
				<input type="hidden" name="given" value={given.ok ? plainMoney(given.cents) : ""} />
				<Button variant="primary" busy={isSaving} disabled={!change?.ok}>
					{change?.ok && change.changeCents > 0 ? "Given back, next sale" : "Paid, next sale"}
				</Button>
			</Form>
		</StallFrame>
	)
}
