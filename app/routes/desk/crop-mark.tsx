import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { dayInZone, monthDay, shortMonthDay } from "~/domain/calendar"
import type { BoardSuper, BoardYard } from "~/domain/crop/board"
import { now as askClock } from "~/platform/clock.server"
import { findBoard } from "~/services/crop/find-board.server"
import { listSuperProducts } from "~/services/crop/find-set-up.server"
import { type MarkRefusal, markSupers } from "~/services/crop/mark-supers.server"
import { adviceWords } from "~/ui/crop/advice-words"
import { ChooseBox, ChosenDeed } from "~/ui/crop/choose-list"
import { NextSuperFields } from "~/ui/crop/next-super-fields"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ListPages } from "~/ui/desk/list-pages"
import { counted } from "~/ui/desk/number-words"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/crop-mark"
import { setOnChosen } from "./crop-set-on.server"
import { errorsOf, type FormError, marksForm, type Typed, typedIn } from "./crop-set-up-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Mark supers · Waxbill" }]

const CHOICES = ["ready", "next-super", "clearing"] as const

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const [yardId, after] = [url.searchParams.get("yard"), url.searchParams.get("after")]
	const { yards, summaries, next } = await findBoard({ producerId: producer.id, today, yardId, after })
	return {
		frame: await findDeskFrame(scope, { part: "crop", now }),
		today,
		yardId,
		after,
		choose: CHOICES.find((one) => one === url.searchParams.get("choose")) ?? null,
		done: Number(url.searchParams.get("done")) || 0,
		yards,
		summaries: summaries.map(({ id, name }) => ({ id, name })),
		next,
		products: await listSuperProducts(producer.id),
		idempotencyKey: randomUUID(),
	}
})

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, url }: Route.ActionArgs, scope) => {
		const form = await request.formData()
		const intent = form.get("intent")
		const typed = typedIn(form, "supers")
		const chosen = typed.chosen.map((value) => value.split("_"))
		const superIds = chosen.map(([superId = ""]) => superId)
		const done = (count: number) => {
			const search = new URLSearchParams(url.searchParams)
			search.delete("choose")
			search.set("done", String(count))
			return redirect(`${url.pathname}?${search}`)
		}
		const refuse = (errors: FormError[]) => data({ errors, typed }, { status: 422 })
		if (superIds.length === 0) return refuse([{ message: "Choose at least one super in the list." }])
		if (intent === "harvest") {
			const search = new URLSearchParams(superIds.map((superId) => ["super", superId]))
			throw redirect(`/desk/${scope.producer.slug}/crop/harvest?${search}`)
		}
		if (intent === "next-super") {
			const set = await setOnChosen(scope, { form, hiveIds: chosen.map(([, hiveId = ""]) => hiveId) })
			if (set.ok) throw done(set.setOn)
			return refuse(set.errors)
		}
		if (intent !== "escape-in" && intent !== "escape-out") throw data(null, { status: 400 })
		const marked = await mark(scope, { form, superIds, intent })
		if (marked.ok) throw done(marked.marked)
		return refuse(marked.errors)
	},
)

async function mark(
	{ producer, person }: DeskScope,
	given: { form: FormData; superIds: string[]; intent: "escape-in" | "escape-out" },
): Promise<{ ok: true; marked: number } | { ok: false; errors: FormError[] }> {
	const { form, superIds, intent } = given
	const today = dayInZone(askClock(), producer.timeZone)
	const parsed = marksForm.safeParse({ on: intent === "escape-out" ? today : form.get("on") })
	if (!parsed.success) return { ok: false, errors: errorsOf(parsed.error) }
	const marked = await markSupers({
		producerId: producer.id,
		personId: person.id,
		today,
		superIds,
		mark: intent,
		on: parsed.data.on,
	})
	return marked.ok ? marked : { ok: false, errors: [refusalWords(marked)] }
}

function refusalWords(refusal: MarkRefusal): FormError {
	switch (refusal.reason) {
		case "none-chosen":
			return { message: "Choose at least one super in the list." }
		case "gone":
			return { message: "One of these supers has come off meanwhile. Open the list again and choose anew." }
		case "in-the-future":
			return { field: "on", message: "Choose today or an earlier day." }
		case "before-set-on":
			return {
				field: "on",
				message: `One of them was set on only on ${monthDay(refusal.setOn)}. Choose that day or a later one.`,
			}
	}
}

export default function CropMark({ loaderData, actionData, params }: Route.ComponentProps) {
	const { yards, summaries, yardId, after, choose, today } = loaderData
	const errors = actionData?.errors ?? []
	const typed: Typed | null = actionData?.typed ?? null
	const base = `/desk/${params.producer}/crop`
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const supers = yards.flatMap(({ hives }) => hives).flatMap((hive) => hive.supers)
	const keep = yardId ? { yard: yardId } : undefined
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Mark supers"
				lead={
					<>
						Choose in the list and say below what was done with them. <Link to={base}>Back to the board</Link>
					</>
				}
			/>
			<ErrorSummary errors={errors} title="Nothing was marked" />
			{loaderData.done > 0 && errors.length === 0 && (
				<MessageLine tone="saved" title={`${counted(loaderData.done, "super")} marked.`}>
					What should come off is worked out anew.
				</MessageLine>
			)}
			{summaries.length > 1 && (
				<FilterLinks
					label="One yard"
					name="yard"
					chosen={yardId ?? ""}
					options={[
						{ value: "", label: "All yards" },
						...summaries.map(({ id, name }) => ({ value: id, label: name })),
					]}
				/>
			)}
			{supers.length === 0 ? (
				<EmptyLine action={<Link to={`${base}/set-up`}>Set supers on hives</Link>}>
					No super is on a hive here.
				</EmptyLine>
			) : (
				<>
					<FilterLinks
						label="Choose in the list"
						name="choose"
						chosen={choose ?? ""}
						keep={keep}
						options={[
							{ value: "", label: "Choose none" },
							{ value: "ready", label: "All that are ready" },
							{ value: "next-super", label: "All that want the next super" },
							{ value: "clearing", label: "All with the bee escape in" },
						]}
					/>
					<Form method="post" key={loaderData.idempotencyKey} noValidate>
						<input
							type="hidden"
							name="idempotencyKey"
							value={typed?.values.idempotencyKey ?? loaderData.idempotencyKey}
						/>
						<MarkTable
							yards={yards}
							base={base}
							isChosen={(value, one) => (typed ? typed.chosen.includes(value) : choose !== null && suits(one, choose))}
						/>
						<div className="chosen-deeds">
							<ChosenDeed title="Bee escape in">
								<TextField
									name="on"
									label="Put in on"
									type="date"
									max={today}
									defaultValue={typed?.values.on ?? today}
									error={errorOf("on")}
									hint="It usually clears a super in one to two days."
								/>
								<Button name="intent" value="escape-in" variant="primary">
									Note the bee escape
								</Button>
							</ChosenDeed>
							<ChosenDeed title="Next super set on">
								<NextSuperFields
									products={loaderData.products}
									values={typed?.values ?? {}}
									today={today}
									errorOf={errorOf}
								/>
								<Button name="intent" value="next-super">
									Set one on each of these hives
								</Button>
							</ChosenDeed>
							<ChosenDeed title="Taken off">
								<p>They are counted, graded and made into lots on the next page.</p>
								<Button name="intent" value="harvest">
									Bring in the harvest
								</Button>
							</ChosenDeed>
							<ChosenDeed title="Bee escape out again">
								<p>Put in too early, or noted by mistake.</p>
								<Button name="intent" value="escape-out">
									Take the note back
								</Button>
							</ChosenDeed>
						</div>
					</Form>
				</>
			)}
			<ListPages
				params={{ ...(yardId ? { yard: yardId } : {}), ...(after ? { after } : {}) }}
				next={loaderData.next}
				laterWords="More hives"
			/>
		</DeskBook>
	)
}

const suits = (one: BoardSuper, choose: (typeof CHOICES)[number]) =>
	choose === "ready" ? one.isReady && !one.isClearing : one.advice.some(({ kind }) => kind === choose)

function MarkTable({
	yards,
	base,
	isChosen,
}: {
	yards: readonly BoardYard[]
	base: string
	isChosen: (value: string, one: BoardSuper) => boolean
}) {
	const rows = yards.flatMap((yard) =>
		yard.hives.flatMap((hive) => hive.supers.map((one) => ({ one, hive, yardName: yard.name }))),
	)
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Super</th>
					<th scope="col" className="max-desk:hidden">
						Yard
					</th>
					<th scope="col" className="max-desk:hidden">
						For
					</th>
					<th scope="col">Last seen</th>
					<th scope="col" className="max-desk:hidden">
						The checks suggest
					</th>
				</tr>
			</thead>
			<tbody>
				{rows.map(({ one, hive, yardName }) => {
					const value = `${one.id}_${hive.id}`
					return (
						<tr key={one.id}>
							<td>
								<ChooseBox
									name="supers"
									value={value}
									label={`Hive ${hive.label}, super ${one.level}`}
									chosen={isChosen(value, one)}
								/>
							</td>
							<td className="max-desk:hidden">{yardName}</td>
							<td className="max-desk:hidden">{one.productName}</td>
							<td>
								<Link className="inline-block py-1" to={`${base}/supers/${one.id}`}>
									{one.latest
										? `${one.latest.cappedPercent}% capped, ${shortMonthDay(one.latest.checkedOn)}`
										: "nobody has looked"}
								</Link>
							</td>
							<td className="max-desk:hidden aside">{one.advice.map(adviceWords).join(" ")}</td>
						</tr>
					)
				})}
			</tbody>
		</table>
	)
}
