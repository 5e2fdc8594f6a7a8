import { data, Form, Link, redirect } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findPriceForm } from "~/services/pricing/find-price-form.server"
import { setPrices } from "~/services/pricing/set-prices.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/price-new"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { readPriceForm, typedIn } from "./price-form"

export const meta: Route.MetaFunction = () => [{ title: "Set a price · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_args: Route.LoaderArgs, scope) => {
	const { products, tiers } = await findPriceForm(scope.producer.id)
	return {
		frame: await findDeskFrame(scope, { part: "prices" }),
		today: dayInZone(askClock(), scope.producer.timeZone),
		products: products.map(({ id, code, name, pricedBy }) => ({
			value: id,
			label: `${code} ${name}${pricedBy === "weight" ? ", by weight" : ""}`,
		})),
		tiers: tiers.map(({ id, name }) => ({ value: id, label: name })),
	}
})

const WORDS = {
	"prices-changed": "This price was changed a moment ago. Look at it and send the form again.",
	"in-the-past": "Choose today or a later day: what was in force is not changed.",
	"not-known": "This product or tier is no longer there.",
} as const

export const action = guard(admits.desk("owner", "desk"), async ({ request, params }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const typed = typedIn(await request.formData())
	const read = readPriceForm(typed, await findPriceForm(producer.id), today)
	if (!read.ok) return data({ typed, errors: read.errors as { field?: string; message: string }[] }, { status: 400 })
	const answer = await setPrices({ producerId: producer.id, personId: person.id, now, today, prices: [read.price] })
	if (!answer.ok) return data({ typed, errors: [{ message: WORDS[answer.reason] }] }, { status: 422 })
	throw redirect(`/desk/${params.producer}/prices?set=${answer.set}`)
})

export default function PriceNew({ loaderData, actionData, params }: Route.ComponentProps) {
	const { products, tiers, today } = loaderData
	const errors: { field?: string; message: string }[] = actionData?.errors ?? []
	const typed: Record<string, string> = actionData?.typed ?? {}
	const field = (name: string, otherwise = "") => ({
		name,
		defaultValue: typed[name] ?? otherwise,
		error: errors.find((error) => error.field === name)?.message,
	})
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Set a price"
				lead="It holds from its day on, until another takes its place. Orders that are placed keep their prices."
				action={<Link to={`/desk/${params.producer}/prices`}>Prices</Link>}
			/>
			<ErrorSummary errors={errors} />
			{products.length === 0 || tiers.length === 0 ? (
				<EmptyLine>There is no product or no price tier yet.</EmptyLine>
			) : (
				<Form method="post" className="sheet-form" noValidate>
					<SelectField {...field("product")} label="Product" options={products} />
					<SelectField {...field("tier")} label="Price tier" options={tiers} />
					<TextField
						{...field("minCases", "1")}
						label="From how many cases"
						hint="All cases of its family in one order are counted."
						inputMode="numeric"
						autoComplete="off"
					/>
					<TextField
						{...field("price")}
						label="Price in dollars"
						hint="For a case; for a pound where the product is priced by weight."
						inputMode="decimal"
						autoComplete="off"
					/>
					<TextField {...field("validFrom", today)} label="From day" type="date" min={today} />
					<div>
						<Button variant="primary">Set this price</Button>
					</div>
				</Form>
			)}
		</DeskBook>
	)
}
