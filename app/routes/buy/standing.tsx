import { useId } from "react"
import { data, Form, Link, redirect, type ShouldRevalidateFunctionArgs, useNavigation } from "react-router"
import { dayWords, isDay } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { endStandingOrder } from "~/services/standing-orders/end-standing-order.server"
import { setStandingOrder } from "~/services/standing-orders/set-standing-order.server"
import { skipDate } from "~/services/standing-orders/skip-date.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine } from "~/ui/layout/sheet"
import { StandingSentence } from "~/ui/standing-orders/sentence"
import { StandingTable } from "~/ui/standing-orders/standing-table"
import { StockKey } from "~/ui/stock/stock-key"
import { admits, guard, type StoreScope } from "../guard.server"
import type { Route } from "./+types/standing"
import { BuyBook } from "./buy-book"
import { loadStanding, standingRefusal } from "./standing.server"
import { readStanding } from "./standing-form"

export const meta: Route.MetaFunction = () => [{ title: "Standing order · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => ({
	...(await loadStanding(scope)),
	showsAll: url.searchParams.has("add"),
	done: url.searchParams.get("done"),
	email: scope.person.email,
}))

export const action = guard(admits.store("buyer", "payer"), async ({ request, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const intent = String(form.get("intent") ?? "save")
	if (intent === "save" || intent === "show") return saveOrShow(form, intent, scope, url.pathname)
	const { producer, store, person } = scope
	const query = { producerId: producer.id, storeId: store.id, personId: person.id, now: now() }
	if (intent === "end") {
		await endStandingOrder(query)
		throw redirect(`${url.pathname}?done=ended`)
	}
	const [, what, ruleOn = ""] = /^(skip|back):(.+)$/.exec(intent) ?? []
	if (!what || !isDay(ruleOn)) throw data(null, { status: 400 })
	const answer = await skipDate({ ...query, zone: producer.timeZone, ruleOn, isSkipped: what === "skip" })
	if (answer.ok) throw redirect(url.pathname)
	const message =
		answer.reason === "closed"
			? "Last orders for that date have passed, so it is fixed."
			: "That date is not one of this standing order any more."
	return data({ errors: { "": message }, values: null, preview: null, idempotencyKey: null }, { status: 422 })
})

async function saveOrShow(form: FormData, intent: "save" | "show", scope: StoreScope, page: string) {
	const posted = readStanding(form)
	if (!posted) throw data(null, { status: 400 })
	const { values, idempotencyKey, cadence, startsOn, endsOn, lines } = posted
	const refuse = (errors: Record<string, string>) =>
		data({ errors, values, preview: null, idempotencyKey }, { status: 422 })
	if (Object.keys(posted.errors).length > 0 || !cadence || !startsOn) return refuse(posted.errors)
	if (intent === "show") {
		const { dates, asked } = await loadStanding(scope, posted)
		return data({ errors: {} as Record<string, string>, values, preview: { dates, asked }, idempotencyKey })
	}
	const { producer, store, person } = scope
	const answer = await setStandingOrder({
		producerId: producer.id,
		storeId: store.id,
		person,
		zone: producer.timeZone,
		now: now(),
		cadence,
		startsOn,
		endsOn,
		lines,
		idempotencyKey,
	})
	if (!answer.ok) return refuse(standingRefusal(answer))
	throw redirect(`${page}?done=saved`)
}

/** Showing the dates of what is typed reads nothing again. */
export function shouldRevalidate({ actionResult, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs): boolean {
	return actionResult?.preview ? false : defaultShouldRevalidate
}

export default function Standing({ loaderData, actionData }: Route.ComponentProps) {
	const { hasStanding, products, producerName, done, email, today } = loaderData
	const values: Record<string, string> = actionData?.values ?? loaderData.values
	const errors: Record<string, string> = actionData?.errors ?? {}
	const preview = actionData?.preview ?? null
	const isSaving = useNavigation().formMethod === "POST"
	const datesForm = useId()
	const asked = new Set(preview?.asked ?? loaderData.asked)
	const showsAll = loaderData.showsAll || !hasStanding || Boolean(actionData?.values)
	const shown = products.filter((product) => showsAll || asked.has(product.productId))
	const dates = preview?.dates ?? loaderData.dates
	return (
		<BuyBook frame={loaderData.frame}>
			{done === "saved" && hasStanding && (
				<MessageLine tone="saved" title="Your standing order is set.">
					A letter with its next dates goes to {email}.
				</MessageLine>
			)}
			{done === "ended" && !hasStanding && (
				<MessageLine tone="saved" title="The standing order has ended.">
					What had closed before is still delivered.
				</MessageLine>
			)}
			<ErrorSummary
				title="The standing order was not changed"
				errors={Object.entries(errors).map(([field, message]) => {
					const product = products.find((one) => field.endsWith(one.productId))
					const words = product ? `${product.code} ${product.name}: ${message}` : message
					return field === "" ? { message: words } : { field, message: words }
				})}
			/>
			<Form method="post" noValidate>
				<input type="hidden" name="idempotencyKey" value={actionData?.idempotencyKey ?? loaderData.idempotencyKey} />
				<header className="sheet-head">
					<h1 className="sr-only">Standing order</h1>
					<div className="min-w-0 flex-[1_1_30rem]">
						<StandingSentence
							values={{
								often: values.often ?? "",
								weekday: values.weekday ?? "",
								startsOn: values.startsOn ?? "",
								endsOn: values.endsOn ?? "",
							}}
							weekdays={loaderData.weekdays}
							starts={loaderData.starts}
							ends={loaderData.ends}
							today={today}
							address={loaderData.address}
							errors={errors}
						/>
					</div>
					<div className="head-action">
						<Button name="intent" value="show" size="big">
							Show the dates
						</Button>
						<Button variant="primary" size="big" name="intent" value="save" busy={isSaving} busyLabel="Saving">
							{hasStanding ? "Save changes" : "Set standing order"}
						</Button>
					</div>
				</header>
				{products.length === 0 ? (
					<EmptyLine>Nothing is for sale to you yet. {producerName} sets the prices of your store first.</EmptyLine>
				) : (
					<StandingTable
						products={shown}
						dates={dates}
						values={values}
						errors={errors}
						producerName={producerName}
						dateAction={
							preview
								? undefined
								: (date) =>
										date.isOpen && (
											<Button
												size="small"
												className="whitespace-nowrap px-2!"
												form={datesForm}
												name="intent"
												value={`${date.isSkipped ? "back" : "skip"}:${date.ruleOn}`}
												aria-label={`${date.isSkipped ? "Put back" : "Skip"} ${dayWords(date.deliveryOn)}`}
											>
												{date.isSkipped ? "Put back" : "Skip"}
											</Button>
										)
						}
					/>
				)}
			</Form>
			<Form method="post" id={datesForm} preventScrollReset>
				<div className="flex flex-wrap items-center gap-x-6 gap-y-3 px-4 py-4 desk:px-8">
					{!showsAll && (
						<Link className="btn plain" to="?add" preventScrollReset>
							Add a product
						</Link>
					)}
					{hasStanding && !preview && (
						<Button variant="plain" name="intent" value="end">
							Stop after what has closed
						</Button>
					)}
					<div className="desk:ml-auto">
						<StockKey
							states={["free", "held", "expected", "short"]}
							words={{ free: "can be met from stock", held: "held", short: "likely short" }}
						/>
					</div>
				</div>
			</Form>
		</BuyBook>
	)
}
