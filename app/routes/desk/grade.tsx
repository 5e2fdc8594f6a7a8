import { randomUUID } from "node:crypto"
import { data, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, fullDay } from "~/domain/calendar"
import { colourByPfund } from "~/domain/grading/colour"
import { gradeComb } from "~/domain/grading/grade-comb"
import { now as askClock } from "~/platform/clock.server"
import { findGradingChoices } from "~/services/lots/find-gradings.server"
import { findLotAtHand } from "~/services/lots/find-lot-at-hand.server"
import { gradeLot } from "~/services/lots/grade-lot.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MarginNote, SheetHead } from "~/ui/layout/sheet"
import { GradeResult } from "~/ui/lots/grade-result"
import { GradingForm } from "~/ui/lots/grading-form"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/grade"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { readGrading, typedGrading } from "./grade-form"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Grade lot ${params.code} · Waxbill` }]

async function findPage(query: { producerId: string; code: string; schemeName: string | null }) {
	const lot = await findLotAtHand(query)
	if (!lot) throw data(null, { status: 404 })
	const { schemes, gradings } = await findGradingChoices({ ...query, form: lot.form })
	return { lot, schemes, gradings, chosen: schemes.find(({ name }) => name === query.schemeName) ?? schemes[0] ?? null }
}

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const schemeName = url.searchParams.get("scheme")
		const page = await findPage({ producerId: scope.producer.id, code: params.code, schemeName })
		return { frame: await findDeskFrame(scope, { part: "lots" }), ...page, formKey: randomUUID() }
	},
)

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, request }: Route.ActionArgs, scope) => {
		const form = await request.formData()
		const { producer, person } = scope
		const typed = typedGrading(form)
		const { chosen } = await findPage({
			producerId: producer.id,
			code: params.code,
			schemeName: typed.values.scheme ?? null,
		})
		const refuse = (errors: { field?: string; message: string }[], status: number) =>
			data({ typed, errors, looked: null }, { status })
		if (!chosen) return refuse([{ message: "Choose a scheme to grade by." }], 400)
		const read = readGrading(typed, chosen.scheme)
		if (!read.ok) return refuse(read.errors, 400)
		const { facts } = read
		if (form.get("intent") === "look") {
			return data({ typed, errors: [], looked: { ...gradeComb(chosen.scheme, facts), faults: facts.faults } })
		}
		const key = z.guid().safeParse(typed.values.key)
		if (!key.success) return refuse([{ message: "Open this page again and send the form once more." }], 400)
		const graded = await gradeLot({
			producerId: producer.id,
			personId: person.id,
			code: params.code,
			gradingId: key.data,
			gradedOn: dayInZone(askClock(), producer.timeZone),
			schemeName: chosen.name,
			scheme: chosen.scheme,
			facts,
		})
		if (graded.ok) throw redirect(`/desk/${producer.slug}/lots/${params.code}/grade/${graded.gradingId}`)
		if (graded.reason === "no-such-lot") throw data(null, { status: 404 })
		return refuse([{ message: "This lot was withdrawn: it is not graded any more." }], 422)
	},
)

export default function Grade({ loaderData, actionData, params }: Route.ComponentProps) {
	const { lot, schemes, chosen, gradings, formKey } = loaderData
	const { errors = [], looked = null, typed = { values: {}, faults: [] } } = actionData ?? {}
	const page = `/desk/${params.producer}/lots/${lot.code}`
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={`Grade lot ${lot.code}`}
				lead={`${lot.productName}, ${lot.detail}, off the hives ${fullDay(lot.harvestedOn)}. Graded so far: ${lot.grade || "not yet"}${lot.pfundTenths === null ? "" : `, colour ${colourByPfund(lot.pfundTenths)}`}.`}
				action={<Link to={page}>Back to the lot</Link>}
			/>
			<ErrorSummary errors={errors} />
			{looked && <GradeResult {...looked} title={`It would be: ${looked.grade}`} />}
			{chosen === null ? (
				<EmptyLine>No scheme covers this form of comb. The owner can write one under Grades and lot codes.</EmptyLine>
			) : (
				<>
					{schemes.length > 1 && (
						<FilterLinks
							label="Grade by"
							name="scheme"
							chosen={chosen.name}
							options={schemes.map(({ name }) => ({ value: name, label: name }))}
						/>
					)}
					<div className="px-4 pb-4 desk:px-8">
						<MarginNote>
							By <b>{chosen.name}</b>: {chosen.scheme.grades.map(({ name }) => name).join(", ")}. {chosen.scheme.source}
						</MarginNote>
					</div>
					<GradingForm
						key={chosen.name}
						scheme={chosen.scheme}
						schemeName={chosen.name}
						formKey={typed.values.key ?? formKey}
						typed={typed}
						pfund={lot.pfundTenths === null ? "" : String(lot.pfundTenths / 10)}
						errorOf={errorOf}
					/>
				</>
			)}
			{gradings.length > 0 && (
				<section className="lot-part" aria-labelledby="earlier-head">
					<h2 className="name" id="earlier-head">
						Graded before
					</h2>
					<ul>
						{gradings.map(({ id, gradedOn, grade, schemeName, who }) => (
							<li key={id}>
								<Link className="inline-block py-1" to={`${page}/grade/${id}`}>
									{fullDay(gradedOn)}: {grade}
								</Link>{" "}
								by {schemeName}
								{who && `, ${who}`}
							</li>
						))}
					</ul>
				</section>
			)}
		</DeskBook>
	)
}
