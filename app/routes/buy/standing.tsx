import { useId } from "react"
import { data, Form, Link, redirect, type ShouldRevalidateFunctionArgs, useNavigation } from "react-router"
import { type Day, dayWords, fullDay, isDay } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { changeDate } from "~/services/standing-orders/change-date.server"
import { endStandingOrder } from "~/services/standing-orders/end-standing-order.server"
import { pauseStandingOrder } from "~/services/standing-orders/pause-standing-order.server"
import { setStandingOrder } from "~/services/standing-orders/set-standing-order.server"
import { skipDate } from "~/services/standing-orders/skip-date.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { EmptyLine, MessageLine } from "~/ui/layout/sheet"
import { SeasonTotals } from "~/ui/standing-orders/season-totals"
import { StandingSentence } from "~/ui/standing-orders/sentence"
import { StandingTable } from "~/ui/standing-orders/standing-table"
import { StockKey } from "~/ui/stock/stock-key"
import { admits, guard, type StoreScope } from "../guard.server"
import type { Route } from "./+types/standing"
import { BuyBook } from "./buy-book"
import { loadStanding, readPosted, standingRefusal, theirWords } from "./standing.server"
import { readDateCases, readPause } from "./standing-form"

export const meta: Route.MetaFunction = () => [{ title: "Standing order · Waxbill" }]

export const loader = guard(admits.store("buyer", "payer"), async ({ url }: Route.LoaderArgs, scope) => ({
	...(await loadStanding(scope)),
	showsAll: url.searchParams.has("add"),
	done: url.searchParams.get("done"),
	openDate: url.searchParams.get("date"),
	email: scope.person.email,
}))

export const action = guard(admits.store("buyer", "payer"), async ({ request, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const intent = String(form.get("intent") ?? "save")
	if (intent === "save" || intent === "show") return saveOrShow(form, intent, scope, url.pathname)
	const { producer, store, person } = scope
	const zone = producer.timeZone
	const query = { producerId: producer.id, storeId: store.id, personId: person.id, now: now(), zone }
	if (intent === "resume") {
		await pauseStandingOrder({ ...query, pause: null })
		throw redirect(url.pathname)
	}
	if (intent === "pause") {
		const { pause, values, errors } = readPause(form)
		if (Object.keys(errors).length > 0) return refuseBend(errors, values)
		const answer = await pauseStandingOrder({ ...query, pause })
		if (answer.ok) throw redirect(url.pathname)
		return refuseBend({ pauseFrom: PAUSE_REFUSALS[answer.reason] }, values)
	}
	if (intent === "end") {
		await endStandingOrder(query)
		throw redirect(`${url.pathname}?done=ended`)
	}
	const [, what, ruleOn = ""] = /^(skip|back|change):(.+)$/.exec(intent) ?? []
	if (!what || !isDay(ruleOn)) throw data(null, { status: 400 })
	const oneDate = readDateCases(form)
	if (what === "change" && Object.keys(oneDate.errors).length > 0) return refuseBend(oneDate.errors, oneDate.values)
	const answer =
		what === "change"
			? await changeDate({ ...query, ruleOn, cases: oneDate.cases })
			: await skipDate({ ...query, ruleOn, isSkipped: what === "skip" })
	if (answer.ok) throw redirect(url.pathname)
	const message =
		answer.reason === "closed"
			? "Last orders for that date have passed, so it is fixed."
			: "That date is not one of this standing order any more."
	return refuseBend({ "": message }, {})
})

const PAUSE_REFUSALS = {
	none: "There is no standing order to pause.",
	"ends-before-start": "The pause ends before it starts.",
	closed: "Last orders for a date in this pause have passed. Choose a later first day.",
}

/** Refuses what was said of single dates or of a pause; the standing order's own fields stay as saved. */
function refuseBend(errors: Record<string, string>, bendValues: Record<string, string>) {
	return data(
		{ errors, values: null, bendValues, preview: null, idempotencyKey: null, meanwhile: null },
		{ status: 422 },
	)
}

async function saveOrShow(form: FormData, intent: "save" | "show", scope: StoreScope, page: string) {
	const posted = await readPosted(form, scope)
	if (!posted) throw data(null, { status: 400 })
	const { values, idempotencyKey, cadence, startsOn, endsOn, lines } = posted
	const bendValues: Record<string, string> = {}
	const refuse = (errors: Record<string, string>, meanwhile: { drawnFrom: string; words: string } | null = null) =>
		data({ errors, values, bendValues, preview: null, idempotencyKey, meanwhile }, { status: 422 })
	if (Object.keys(posted.errors).length > 0 || !cadence || !startsOn) return refuse(posted.errors)
	if (intent === "show") {
		const { dates, asked } = await loadStanding(scope, posted)
		const errors: Record<string, string> = {}
		return data({ errors, values, bendValues, preview: { dates, asked }, idempotencyKey, meanwhile: null })
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
		isCommitment: posted.isCommitment,
		...(posted.drawnFrom === undefined ? {} : { drawnFrom: posted.drawnFrom }),
		idempotencyKey,
	})
	if (!answer.ok && answer.reason === "changed-meanwhile") {
		const words = await theirWords(scope, answer.theirs)
		return refuse(standingRefusal(answer), { drawnFrom: answer.theirs?.id ?? "", words })
	}
	if (!answer.ok) return refuse(standingRefusal(answer))
	throw redirect(`${page}?done=saved`)
}

/** Showing the dates of what is typed reads nothing again. */
export function shouldRevalidate({ actionResult, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs): boolean {
	return actionResult?.preview ? false : defaultShouldRevalidate
}

export default function Standing({ loaderData, actionData }: Route.ComponentProps) {
	const { hasStanding, products, producerName, done, email, today } = loaderData
	const values: Record<string, string> = {
		...(actionData?.values ?? loaderData.values),
		...actionData?.bendValues,
	}
	const meanwhile = actionData?.meanwhile ?? null
	const errors: Record<string, string> = actionData?.errors ?? {}
	const preview = actionData?.preview ?? null
	const isSaving = useNavigation().formMethod === "POST"
	const datesForm = useId()
	const asked = new Set(preview?.asked ?? loaderData.asked)
	const showsAll = loaderData.showsAll || !hasStanding || Boolean(actionData?.values)
	const shown = products.filter((product) => showsAll || asked.has(product.productId))
	const dates = preview?.dates ?? loaderData.dates
	const open = preview ? undefined : dates.find((date) => date.ruleOn === loaderData.openDate && date.isOpen)
	const openDate = open && !open.isSkipped ? { ruleOn: open.ruleOn, formId: datesForm } : null
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
			{meanwhile && (
				<MessageLine
					tone="problem"
					title="Two of you were at it."
					action={
						<Link className="btn" to="?" reloadDocument>
							Keep theirs
						</Link>
					}
				>
					{meanwhile.words} What you typed is still below: save to put yours in its place.
				</MessageLine>
			)}
			<Form method="post" noValidate>
				<input
					type="hidden"
					name="drawnFrom"
					value={meanwhile?.drawnFrom ?? values.drawnFrom ?? loaderData.standingId ?? ""}
				/>
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
						{loaderData.pause && <p className="lead">{pauseWords(loaderData.pause, today)}</p>}
						<label className="mt-2 flex gap-2">
							<input
								type="checkbox"
								name="isCommitment"
								value="yes"
								defaultChecked={actionData?.values ? values.isCommitment === "yes" : loaderData.isCommitment}
							/>
							<span>
								Commit for the season{" "}
								<span className="note">
									You say now what you will take all season; when the crop is short you are served before others.
								</span>
							</span>
						</label>
					</div>
					<div className="head-action">
						<Button name="intent" value="show" size="big">
							Show the dates
						</Button>
						<Button variant="primary" size="big" name="intent" value="save" busy={isSaving} busyLabel="Saving">
							{meanwhile ? "Save mine over it" : hasStanding ? "Save changes" : "Set standing order"}
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
						openDate={openDate}
						dateAction={
							preview
								? undefined
								: (date) =>
										openDate
											? date.ruleOn === openDate.ruleOn && (
													<>
														<Button
															size="small"
															className="px-2!"
															form={datesForm}
															name="intent"
															value={`change:${date.ruleOn}`}
														>
															Keep
														</Button>{" "}
														<Link className="btn plain" to="?" preventScrollReset>
															Back
														</Link>
													</>
												)
											: date.isOpen && (
													<>
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
														{!date.isSkipped && hasStanding && (
															<Link
																className="btn plain"
																to={`?date=${date.ruleOn}`}
																preventScrollReset
																aria-label={`Change ${dayWords(date.deliveryOn)} only`}
															>
																Change
															</Link>
														)}
													</>
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
					{hasStanding && (
						<Link className="btn plain" to="year" relative="path">
							The year ahead
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
			{hasStanding && !preview && (
				<Form method="post" noValidate className="flex flex-wrap items-end gap-x-6 gap-y-3 px-4 pb-4 desk:px-8">
					{loaderData.pause ? (
						<Button name="intent" value="resume">
							Resume deliveries
						</Button>
					) : (
						<>
							<TextField
								name="pauseFrom"
								type="date"
								label="Pause from"
								defaultValue={values.pauseFrom ?? ""}
								error={errors.pauseFrom}
							/>
							<TextField
								name="pauseUntil"
								type="date"
								label="until, or empty"
								defaultValue={values.pauseUntil ?? ""}
								error={errors.pauseUntil}
							/>
							<Button name="intent" value="pause">
								Pause from this date
							</Button>
						</>
					)}
				</Form>
			)}
			<SeasonTotals season={loaderData.season} />
		</BuyBook>
	)
}

/** "Paused from August 20, 2026 until September 3, 2026." */
function pauseWords(pause: { from: Day; until: Day | null }, today: Day): string {
	if (pause.until && pause.until < today) return `It was paused until ${fullDay(pause.until)}.`
	const until = pause.until ? ` until ${fullDay(pause.until)}` : " until you resume"
	return `Paused from ${fullDay(pause.from)}${until}.`
}
