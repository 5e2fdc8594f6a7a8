import { randomUUID } from "node:crypto"
import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { findYardSetUp, type HiveInYard } from "~/services/crop/find-set-up.server"
import { type HiveChange, type HivePlacesRefusal, setUpHivePlaces } from "~/services/crop/set-up-hive-places.server"
import { setUpYard } from "~/services/crop/set-up-yard.server"
import { ChooseBox, ChosenDeed } from "~/ui/crop/choose-list"
import { NextSuperFields } from "~/ui/crop/next-super-fields"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/crop-set-up-yard"
import { setOnChosen } from "./crop-set-on.server"
import { errorsOf, type FormError, type Typed, typedIn, yardForm } from "./crop-set-up-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [{ title: `${loaderData?.yard.name ?? "Yard"} · Waxbill` }]

export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const yardId = z.guid().safeParse(params.yard)
	const found = yardId.success && (await findYardSetUp({ producerId: producer.id, yardId: yardId.data }))
	if (!found) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "crop", now }),
		...found,
		today: dayInZone(now, producer.timeZone),
		idempotencyKey: randomUUID(),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params, url }: Route.ActionArgs, scope) => {
	const yardId = z.guid().safeParse(params.yard)
	if (!yardId.success) throw data(null, { status: 404 })
	const form = await request.formData()
	const typed = typedIn(form, "hives")
	const done = await doIt(scope, { form, yardId: yardId.data, hiveIds: typed.chosen })
	if (done.ok) throw redirect(url.pathname)
	return data({ errors: done.errors, typed }, { status: 422 })
})

type Done = { ok: true } | { ok: false; errors: FormError[] }

async function doIt(scope: DeskScope, given: { form: FormData; yardId: string; hiveIds: string[] }): Promise<Done> {
	const { form, yardId, hiveIds } = given
	const intent = form.get("intent")
	if (intent === "yard") return changeYard(scope, form, yardId)
	if (!z.array(z.guid()).min(1).safeParse(hiveIds).success) {
		return { ok: false, errors: [{ message: "Choose at least one hive in the list." }] }
	}
	if (intent === "supers") return setOnChosen(scope, { form, hiveIds })
	const change = changeOf(form)
	if (!change) throw data(null, { status: 400 })
	const placed = await setUpHivePlaces({ producerId: scope.producer.id, personId: scope.person.id, hiveIds, change })
	return placed.ok ? placed : { ok: false, errors: [refusalWords(placed)] }
}

async function changeYard({ producer, person }: DeskScope, form: FormData, yardId: string): Promise<Done> {
	const parsed = yardForm.safeParse(Object.fromEntries(form))
	if (!parsed.success) return { ok: false, errors: errorsOf(parsed.error) }
	const changed = await setUpYard({ producerId: producer.id, personId: person.id, yardId, ...parsed.data })
	if (changed.ok) return changed
	if (changed.reason === "not-found") throw data(null, { status: 404 })
	return { ok: false, errors: [{ field: "name", message: "There is another yard of this name." }] }
}

function changeOf(form: FormData): HiveChange | null {
	const intent = form.get("intent")
	const toYardId = z.guid().safeParse(form.get("toYardId"))
	if (intent === "move" && toYardId.success) return { to: "yard", yardId: toYardId.data }
	if (intent === "retire") return { to: "retired" }
	return intent === "in-use" ? { to: "in-use" } : null
}

function refusalWords(refusal: HivePlacesRefusal): FormError {
	switch (refusal.reason) {
		case "none-chosen":
			return { message: "Choose at least one hive in the list." }
		case "gone":
			return { message: "One of these hives is not there any more. Open the page again and choose anew." }
		case "no-such-yard":
			return { field: "toYardId", message: "Choose a yard of the list." }
		case "supers-on":
			return {
				message: `Supers are still on hive ${refusal.labels.slice(0, 5).join(", ")}. Take them off first; then it can be retired.`,
			}
	}
}

export default function CropSetUpYard({ loaderData, actionData, params }: Route.ComponentProps) {
	const { yard, yards, hives, products, today } = loaderData
	const errors = actionData?.errors ?? []
	const typed: Typed | null = actionData?.typed ?? null
	const values = typed?.values ?? {}
	const base = `/desk/${params.producer}/crop`
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const others = yards.filter(({ id }) => id !== yard.id)
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={yard.name}
				lead={
					<>
						{yard.flora && `${yard.flora}. `}
						<Link to={`${base}/set-up`}>All yards and hives</Link>
					</>
				}
			/>
			<ErrorSummary errors={errors} title="Nothing was changed" />
			<Form method="post" key={loaderData.idempotencyKey} noValidate>
				<input type="hidden" name="idempotencyKey" value={values.idempotencyKey ?? loaderData.idempotencyKey} />
				{hives.length === 0 ? (
					<EmptyLine action={<Link to={`${base}/set-up`}>Enter hives</Link>}>No hive stands here yet.</EmptyLine>
				) : (
					<>
						<HiveTable hives={hives} chosen={typed?.chosen ?? []} />
						<div className="chosen-deeds">
							<ChosenDeed title="Set a super on the chosen hives">
								<NextSuperFields products={products} values={values} today={today} errorOf={errorOf} />
								<Button name="intent" value="supers" variant="primary">
									Set them on
								</Button>
							</ChosenDeed>
							{others.length > 0 && (
								<ChosenDeed title="Move the chosen hives">
									<SelectField
										name="toYardId"
										label="To the yard"
										options={others.map(({ id, name }) => ({ value: id, label: name }))}
										defaultValue={values.toYardId}
										error={errorOf("toYardId")}
									/>
									<Button name="intent" value="move">
										Move them with what is on them
									</Button>
								</ChosenDeed>
							)}
							<ChosenDeed title="Retire the chosen hives">
								<p>They leave the board; what came off them keeps their names.</p>
								<Button name="intent" value="retire">
									Retire them
								</Button>
								{hives.some(({ isActive }) => !isActive) && (
									<Button name="intent" value="in-use">
										Put them back in use
									</Button>
								)}
							</ChosenDeed>
						</div>
					</>
				)}
			</Form>
			<Form method="post" className="chosen-deeds" noValidate>
				<input type="hidden" name="intent" value="yard" />
				<ChosenDeed title="The yard's words">
					<TextField
						name="name"
						label="Name"
						autoComplete="off"
						defaultValue={values.name ?? yard.name}
						error={errorOf("name")}
					/>
					<TextField
						name="flora"
						label="What flowers there"
						autoComplete="off"
						defaultValue={values.flora ?? yard.flora}
						error={errorOf("flora")}
					/>
					<Button>Save the words</Button>
				</ChosenDeed>
			</Form>
		</DeskBook>
	)
}

function HiveTable({ hives, chosen }: { hives: readonly HiveInYard[]; chosen: readonly string[] }) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">Hive</th>
					<th scope="col" className="num">
						Supers on
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Pieces they hold
					</th>
				</tr>
			</thead>
			<tbody>
				{hives.map((hive) => (
					<tr key={hive.id}>
						<td>
							<ChooseBox
								name="hives"
								value={hive.id}
								label={`Hive ${hive.label}${hive.isActive ? "" : ", retired"}`}
								chosen={chosen.includes(hive.id)}
							/>
						</td>
						<td className="num fig">{hive.supersOn}</td>
						<td className="num fig pr-4! desk:pr-8!">{hive.pieces}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}
