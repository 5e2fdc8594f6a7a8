import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, fullDay } from "~/domain/calendar"
import { percentWords } from "~/domain/invoicing/percent-words"
import { plainMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { dropTaxRate, findTaxRates, setOwnTaxRate, setTaxRate } from "~/services/invoicing/tax-rates.server"
import { counted } from "~/ui/desk/number-words"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/tax-rates"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { ownRateForm, taxRateForm } from "./tax-rate-form"

export const meta: Route.MetaFunction = () => [{ title: "Sales tax · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const today = dayInZone(askClock(), scope.producer.timeZone)
	return {
		frame: await findDeskFrame(scope, { part: "invoices" }),
		book: await findTaxRates({ producerId: scope.producer.id, today }),
		today,
		isSaved: url.searchParams.has("saved"),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, url }: Route.ActionArgs, scope) => {
	const form = Object.fromEntries(
		[...(await request.formData())].map(([name, value]) => [name, String(value).slice(0, 200)]),
	)
	const by = { producerId: scope.producer.id, personId: scope.person.id }
	const today = dayInZone(askClock(), scope.producer.timeZone)
	const saved = () => redirect(`${url.pathname}?saved`)
	const refuse = (errors: { field?: string; message: string }[], status = 422) =>
		data({ errors, values: form }, { status })
	const wrong = (error: z.ZodError) =>
		refuse(
			error.issues.map(({ path, message }) => ({ field: String(path[0]), message })),
			400,
		)
	if (form.intent === "own") {
		const read = ownRateForm.safeParse(form)
		if (!read.success) return wrong(read.error)
		await setOwnTaxRate({ ...by, basisPoints: read.data.ownPercent })
		throw saved()
	}
	if (form.intent === "drop") {
		const rateId = z.guid().safeParse(form.rateId)
		if (rateId.success && (await dropTaxRate({ ...by, rateId: rateId.data, today }))) throw saved()
		return refuse([{ message: "That rate has begun or is gone. Write a new one from a later day." }])
	}
	const read = taxRateForm.safeParse(form)
	if (!read.success) return wrong(read.error)
	const { place, validFrom, percent: basisPoints } = read.data
	const set = await setTaxRate({ ...by, place, validFrom, basisPoints, today })
	if (set.ok) throw saved()
	return refuse([{ field: "validFrom", message: "Choose today or a later day: invoices of earlier days have gone." }])
})

export default function TaxRates({ loaderData, actionData, params }: Route.ComponentProps) {
	const { book, today, isSaved } = loaderData
	const values: Record<string, string> = actionData?.values ?? {}
	const errorOf = (field: string) => actionData?.errors.find((error) => error.field === field)?.message
	const places = [...new Set(book.rates.map(({ place }) => place))]
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Sales tax"
				lead="The rate of a place holds from its day on, until a later one begins. What was issued keeps its rate."
				note="Local rules decide what is taxed, where, and at which rate. Ask your tax authority; nothing here is advice."
				action={<Link to={`/desk/${params.producer}/invoices`}>Invoices</Link>}
			/>
			<ErrorSummary errors={actionData?.errors ?? []} />
			{isSaved && !actionData && <MessageLine tone="saved" title="Kept." />}
			{book.rates.length === 0 ? (
				<EmptyLine>No place has a rate of its own. Stores are charged your own rate.</EmptyLine>
			) : (
				<RateTable book={book} />
			)}
			<Form method="post" className="payment-form" noValidate aria-label="Write a rate">
				<TextField
					name="place"
					label="Place"
					list="places"
					autoComplete="off"
					hint="As your tax authority names it: a county, a town, a district."
					defaultValue={values.place ?? ""}
					error={errorOf("place")}
				/>
				<datalist id="places">
					{places.map((place) => (
						<option key={place} value={place} />
					))}
				</datalist>
				<TextField
					name="percent"
					label="Rate in percent"
					inputMode="decimal"
					autoComplete="off"
					defaultValue={values.percent ?? ""}
					error={errorOf("percent")}
				/>
				<TextField
					name="validFrom"
					label="From"
					type="date"
					min={today}
					defaultValue={values.validFrom ?? today}
					error={errorOf("validFrom")}
				/>
				<div className="payment-button">
					<Button variant="primary" name="intent" value="set">
						Write the rate
					</Button>
				</div>
			</Form>
			<Form method="post" className="payment-form" noValidate aria-label="Your own rate">
				<TextField
					name="ownPercent"
					label="Your own rate in percent"
					inputMode="decimal"
					autoComplete="off"
					hint="Charged to stores that name no place, and at the stall."
					defaultValue={values.ownPercent ?? plainMoney(book.ownBasisPoints)}
					error={errorOf("ownPercent")}
				/>
				<div className="payment-button">
					<Button name="intent" value="own">
						Set your own rate
					</Button>
				</div>
			</Form>
		</DeskBook>
	)
}

type Book = Route.ComponentProps["loaderData"]["book"]

const STANDING_WORDS = { "in-force": "in force", past: "past", "to-come": "to come" } as const

function RateTable({ book }: { book: Book }) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Place</th>
					<th scope="col">From</th>
					<th scope="col" className="num">
						Rate
					</th>
					<th scope="col">Standing</th>
					<th scope="col" className="pr-4! desk:pr-8!">
						<span className="max-desk:sr-only">Stores</span>
					</th>
				</tr>
			</thead>
			<tbody>
				{book.rates.map((rate) => (
					<tr key={rate.id} className={rate.standing === "past" ? "text-ink-soft" : undefined}>
						<td>{rate.place}</td>
						<td>{fullDay(rate.validFrom)}</td>
						<td className="num whitespace-nowrap">{percentWords(rate.basisPoints)}</td>
						<td>{STANDING_WORDS[rate.standing]}</td>
						<td className="pr-4! desk:pr-8!">
							{rate.standing === "in-force" && storesWords(book, rate.place)}
							{rate.standing === "to-come" && (
								<Form method="post">
									<input type="hidden" name="rateId" value={rate.id} />
									<Button
										size="small"
										variant="plain"
										name="intent"
										value="drop"
										aria-label={`Take back the rate of ${rate.place} from ${fullDay(rate.validFrom)}`}
									>
										Take back
									</Button>
								</Form>
							)}
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

/** "three stores, one of them exempt". */
function storesWords({ stores }: Book, place: string): string {
	const same = (other: string) => other.trim().toLowerCase() === place.trim().toLowerCase()
	const own = stores.filter((store) => same(store.place))
	const count = own.reduce((sum, store) => sum + store.count, 0)
	const exempt = own.reduce((sum, store) => sum + store.exempt, 0)
	if (count === 0) return "no store"
	return `${counted(count, "store")}${exempt > 0 ? `, ${exempt === count ? "all" : exempt} with a resale certificate` : ""}`
}
