import { data, Form, Link, redirect } from "react-router"
import { listYards } from "~/services/crop/find-set-up.server"
import { setUpHives } from "~/services/crop/set-up-hives.server"
import { setUpYard } from "~/services/crop/set-up-yard.server"
import { ChosenDeed } from "~/ui/crop/choose-list"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/crop-set-up"
import { errorsOf, type FormError, hivesForm, typedIn, yardForm } from "./crop-set-up-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Yards and hives · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_: Route.LoaderArgs, scope) => ({
	frame: await findDeskFrame(scope, { part: "crop" }),
	yards: await listYards(scope.producer.id),
}))

export const action = guard(admits.desk("owner", "desk"), async ({ request, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const intent = form.get("intent")
	const entered = intent === "yard" ? await enterYard(form, scope) : await enterHives(form, scope)
	if (entered.ok) throw redirect(`${url.pathname}/${entered.yardId}`)
	return data({ errors: entered.errors, typed: typedIn(form, "hives") }, { status: 422 })
})

type Entered = { ok: true; yardId: string } | { ok: false; errors: FormError[] }

async function enterYard(form: FormData, { producer, person }: DeskScope): Promise<Entered> {
	const parsed = yardForm.safeParse(Object.fromEntries(form))
	if (!parsed.success) return { ok: false, errors: errorsOf(parsed.error) }
	const entered = await setUpYard({ producerId: producer.id, personId: person.id, yardId: null, ...parsed.data })
	if (entered.ok) return entered
	return { ok: false, errors: [{ field: "name", message: "There is a yard of this name already." }] }
}

async function enterHives(form: FormData, { producer, person }: DeskScope): Promise<Entered> {
	const parsed = hivesForm.safeParse(Object.fromEntries(form))
	if (!parsed.success) return { ok: false, errors: errorsOf(parsed.error) }
	const entered = await setUpHives({ producerId: producer.id, personId: person.id, ...parsed.data })
	if (entered.ok) return { ok: true, yardId: parsed.data.yardId }
	if (entered.reason === "no-such-yard") {
		return { ok: false, errors: [{ field: "yardId", message: "Choose a yard of the list." }] }
	}
	const message =
		entered.reason === "no-number"
			? "To count up from it, the first label must end in a number, such as 12 or A7."
			: `There is a hive ${entered.labels.slice(0, 5).join(", ")} already. Labels are one of a kind.`
	return { ok: false, errors: [{ field: "firstLabel", message }] }
}

export default function CropSetUp({ loaderData, actionData, params }: Route.ComponentProps) {
	const { yards } = loaderData
	const errors = actionData?.errors ?? []
	const values: Record<string, string> = actionData?.typed.values ?? {}
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const base = `/desk/${params.producer}/crop`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Yards and hives"
				lead={
					<>
						Open a yard to set supers on its hives, move them or retire them. <Link to={base}>Back to the board</Link>
					</>
				}
			/>
			<ErrorSummary errors={errors} title="Nothing was entered" />
			{yards.length === 0 ? (
				<EmptyLine>No yard is entered yet. Enter the first below, then its hives.</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Yard</th>
							<th scope="col">Flora</th>
							<th scope="col" className="num">
								Hives
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								Supers on
							</th>
						</tr>
					</thead>
					<tbody>
						{yards.map((yard) => (
							<tr key={yard.id}>
								<td>
									<Link className="name inline-block py-1 text-body!" to={`${base}/set-up/${yard.id}`}>
										{yard.name}
									</Link>
								</td>
								<td>{yard.flora}</td>
								<td className="num fig">{yard.hives}</td>
								<td className="num fig pr-4! desk:pr-8!">{yard.supersOn}</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
			<div className="chosen-deeds">
				{yards.length > 0 && (
					<Form method="post" noValidate>
						<input type="hidden" name="intent" value="hives" />
						<ChosenDeed title="Enter hives">
							<SelectField
								name="yardId"
								label="Yard"
								options={yards.map(({ id, name }) => ({ value: id, label: name }))}
								defaultValue={values.yardId}
								error={errorOf("yardId")}
							/>
							<TextField
								name="firstLabel"
								label="Painted on the first"
								hint="The others count up from it: 12, 13, 14."
								autoComplete="off"
								defaultValue={values.firstLabel}
								error={errorOf("firstLabel")}
							/>
							<TextField
								name="count"
								label="How many"
								inputMode="numeric"
								defaultValue={values.count ?? "1"}
								error={errorOf("count")}
							/>
							<Button variant="primary">Enter the hives</Button>
						</ChosenDeed>
					</Form>
				)}
				<Form method="post" noValidate>
					<input type="hidden" name="intent" value="yard" />
					<ChosenDeed title="Enter a yard">
						<TextField name="name" label="Name" autoComplete="off" defaultValue={values.name} error={errorOf("name")} />
						<TextField
							name="flora"
							label="What flowers there"
							hint="Such as white clover. It may be left empty."
							autoComplete="off"
							defaultValue={values.flora}
							error={errorOf("flora")}
						/>
						<Button variant={yards.length > 0 ? "second" : "primary"}>Enter the yard</Button>
					</ChosenDeed>
				</Form>
			</div>
		</DeskBook>
	)
}
