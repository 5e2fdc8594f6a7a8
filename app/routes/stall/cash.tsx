import { randomUUID } from "node:crypto"
import { data, Form, redirect, useNavigation } from "react-router"
import { formatMoney, plainMoney } from "~/domain/money"
import { changeFor, likelyAmounts } from "~/domain/stall/change"
import { saleTotals } from "~/domain/stall/sale-totals"
import { findStallPage } from "~/services/stall/find-stall-page.server"
import { takeCash } from "~/services/stall/take-cash.server"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import { MessageLine } from "~/ui/layout/sheet"
import { StallFrame } from "~/ui/layout/stall-frame"
import { GiveBack } from "~/ui/stall/stall-pay"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/cash"
import { parseGiven } from "./parse-given"
import { readSale, type SaleInHand, saleFields, saleQuery } from "./sale-in-hand"
import { saleRefusalWords } from "./sale-refusal-words"
import { notFound, viewerOf } from "./viewer.server"

export const meta: Route.MetaFunction = () => [{ title: "Cash · Waxbill" }]

export const loader = guard(admits.stall, async ({ params, url }: Route.LoaderArgs, scope) => {
	const found = await findStallPage({ producerId: scope.producer.id, dayId: params.day, viewer: viewerOf(scope) })
	if (!found) throw notFound()
	const base = `/stall/${scope.producer.slug}/${params.day}`
	const sale = readSale(url.searchParams, randomUUID())
	const prices = new Map(found.table.map((item) => [item.productId, item.pieceCents]))
	const lines = sale.items.map((item) => ({ ...item, pieceCents: prices.get(item.productId) ?? 0 }))
	const { totalCents } = saleTotals(lines)
	if (totalCents === 0) throw redirect(base)
	const typed = url.searchParams.get("other") || url.searchParams.get("given") || ""
	return { base, sale, totalCents, likely: likelyAmounts(totalCents), typed, given: parseGiven(typed) }
})

/** Writes the sale: the money is in the box and the change is given back. */
export const action = guard(admits.stall, async ({ params, request }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const sale = readSale(form, randomUUID())
	const given = parseGiven(String(form.get("given") ?? ""))
	if (!given.ok) return data({ problem: "Say first what they gave you." }, { status: 422 })
	const taken = await takeCash({
		producerId: scope.producer.id,
		dayId: params.day,
		viewer: viewerOf(scope),
		saleId: sale.saleId,
		items: sale.items,
		givenCents: given.cents,
	})
	if (taken.ok) {
		const done = new URLSearchParams({ done: `Sold for ${formatMoney(taken.totalCents)} in cash.` })
		return redirect(`/stall/${scope.producer.slug}/${params.day}?${done}`)
	}
	const problem = saleRefusalWords(taken)
	if (problem === null) throw notFound()
	return data({ problem }, { status: 422 })
})

/** What did they give you, and what to give back. */
export default function StallCash({ loaderData, actionData }: Route.ComponentProps) {
	const { base, sale, totalCents, likely, typed, given } = loaderData
	const isSaving = useNavigation().formMethod === "POST"
	const change = given.ok ? changeFor({ dueCents: totalCents, givenCents: given.cents }) : null
	return (
		<StallFrame
			title="Cash"
			back={{ to: `${base}?${saleQuery(sale)}`, label: "Back to the sale" }}
			figure={formatMoney(totalCents)}
		>
			{actionData && <MessageLine tone="problem" title={actionData.problem} />}
			<Form method="get" className="cash-given" preventScrollReset>
				<SaleFields sale={sale} />
				<fieldset>
					<legend>What did they give you?</legend>
					<div className="given">
						{likely.map((cents) => (
							<button
								key={cents}
								type="submit"
								name="given"
								value={plainMoney(cents)}
								aria-pressed={given.ok && given.cents === cents}
							>
								<span className="fig">{wholeMoney(cents)}</span>
								{cents === totalCents && <small>exact</small>}
							</button>
						))}
					</div>
				</fieldset>
				<div className="cash-other">
					<TextField
						name="other"
						label="Other amount"
						inputMode="decimal"
						autoComplete="off"
						defaultValue={given.ok && !likely.includes(given.cents) ? plainMoney(given.cents) : given.ok ? "" : typed}
						error={given.ok || typed === "" ? undefined : given.message}
					/>
					<Button>Work out change</Button>
				</div>
			</Form>
			{change && (
				<GiveBack
					total={change.ok ? formatMoney(change.changeCents) : formatMoney(0)}
					pieces={change.ok ? change.parts.map((part) => ({ ...part, amount: plainMoney(part.sumCents) })) : []}
					message={change.ok ? (change.changeCents === 0 ? "Nothing to give back." : undefined) : change.words}
				/>
			)}
			<Form method="post" className="cash-done">
				<SaleFields sale={sale} />
				<input type="hidden" name="given" value={given.ok ? plainMoney(given.cents) : ""} />
				<Button variant="primary" busy={isSaving} disabled={!change?.ok}>
					{change?.ok && change.changeCents > 0 ? "Given back, next sale" : "Paid, next sale"}
				</Button>
			</Form>
		</StallFrame>
	)
}

function SaleFields({ sale }: { sale: SaleInHand }) {
	return saleFields(sale).map(([name, value]) => <input key={name} type="hidden" name={name} value={value} />)
}

/** Round sums without their cents, as people say them: "$60", "$49.50". */
function wholeMoney(cents: number): string {
	return formatMoney(cents).replace(/\.00$/, "")
}
