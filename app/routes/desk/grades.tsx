import { randomUUID } from "node:crypto"
import { data, Link, redirect } from "react-router"
import { z } from "zod"
import type { GradeScheme } from "~/domain/grading/grade-comb"
import { schemeTemplates } from "~/domain/grading/templates"
import { findLotSettings, saveLotSettings } from "~/services/lots/lot-code-settings.server"
import { listSchemes, putSchemeAway, saveScheme } from "~/services/lots/save-scheme.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { LotCodeForm } from "~/ui/lots/lot-code-form"
import { GRADE_ROWS, SchemeForm, schemeAsTyped } from "~/ui/lots/scheme-form"
import { SchemeList } from "~/ui/lots/scheme-list"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/grades"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { readScheme, typedScheme } from "./grades-form"

export const meta: Route.MetaFunction = () => [{ title: "Grades and lot codes · Waxbill" }]

const EMPTY: GradeScheme = { source: "", forms: [], grades: [], colours: [], caseRule: null, belowPercent: 0 }

/** The scheme that the address names: one of the producer's, a published one to start from, or an empty one. */
async function findChosen(producerId: string, url: URL) {
	const schemes = await listSchemes(producerId)
	const [id, template] = [url.searchParams.get("scheme"), url.searchParams.get("from")]
	if (id === null && template === null) return { schemes, chosen: null }
	if (id !== null) {
		const own = schemes.find((scheme) => scheme.id === id)
		if (!own) throw data(null, { status: 404 })
		return { schemes, chosen: { ...own, isNew: false } }
	}
	const { name = "", scheme = EMPTY } = schemeTemplates.find((one) => one.name === template) ?? {}
	return { schemes, chosen: { id: "", name, scheme, isNew: true } }
}

export const loader = guard(admits.desk("owner"), async ({ url }: Route.LoaderArgs, scope) => {
	const producerId = scope.producer.id
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		...(await findChosen(producerId, url)),
		settings: await findLotSettings(producerId),
		saved: url.searchParams.has("saved"),
		formKey: randomUUID(),
	}
})

export const action = guard(admits.desk("owner"), async ({ request, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	if (form.get("intent") === "codes") return saveCodes(form, scope, url.pathname)
	const { chosen } = await findChosen(scope.producer.id, url)
	const typed = typedScheme(form)
	const refuse = (errors: { field?: string; message: string }[], status: number) => data({ typed, errors }, { status })
	if (!chosen) return refuse([{ message: "Choose a scheme first." }], 400)
	if (form.get("intent") === "put-away") {
		await putSchemeAway({ producerId: scope.producer.id, id: chosen.id })
		throw redirect(`${url.pathname}?saved`)
	}
	const rows = chosen.scheme.grades.length + GRADE_ROWS
	const read = readScheme(typed, { rows, caseRule: chosen.scheme.caseRule })
	if (!read.ok) return refuse(read.errors, 400)
	const key = z.guid().safeParse(typed.key?.[0])
	if (!key.success) return refuse([{ message: "Open this page again and send the form once more." }], 400)
	const id = chosen.isNew ? key.data : chosen.id
	const saved = await saveScheme({ producerId: scope.producer.id, ...read, id, isNew: chosen.isNew })
	if (saved.ok) throw redirect(`${url.pathname}?saved`)
	if (saved.reason === "no-such-scheme") throw data(null, { status: 404 })
	return refuse([{ field: "name", message: "Another scheme has this name, or one that was put away." }], 422)
})

async function saveCodes(form: FormData, { producer }: DeskScope, page: string) {
	const typed = typedScheme(form)
	const [pattern, days] = [typed.pattern?.[0] ?? "", typed.days?.[0]?.trim() ?? ""]
	if (!/^\d{1,4}$/.test(days) || Number(days) < 1 || Number(days) > 1500) {
		return data({ typed, errors: [{ field: "days", message: "Write whole days from 1 to 1500." }] }, { status: 400 })
	}
	const saved = await saveLotSettings({
		producerId: producer.id,
		lotCodePattern: pattern,
		bestBeforeDays: Number(days),
	})
	if (saved.ok) throw redirect(`${page}?saved`)
	return data({ typed, errors: [{ field: "pattern", message: saved.message }] }, { status: 422 })
}

export default function Grades({ loaderData, actionData, params }: Route.ComponentProps) {
	const { schemes, chosen, settings, saved, formKey } = loaderData
	const errors: { field?: string; message: string }[] = actionData?.errors ?? []
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const page = `/desk/${params.producer}/grades`
	const typed = actionData?.typed ?? null
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={chosen ? chosen.name || "A scheme of your own" : "Grades and lot codes"}
				lead="Published schemes differ, and a scheme here is yours to change. What was graded stays as it was."
				action={<Link to={chosen ? page : `/desk/${params.producer}/lots`}>{chosen ? "All schemes" : "Lots"}</Link>}
			/>
			<ErrorSummary errors={errors} />
			{saved && errors.length === 0 && <MessageLine tone="saved" title="Kept." />}
			{chosen ? (
				<SchemeForm
					key={`${chosen.id} ${chosen.name}`}
					formKey={typed?.key?.[0] ?? formKey}
					isNew={chosen.isNew}
					rows={chosen.scheme.grades.length + (chosen.isNew ? GRADE_ROWS : 1)}
					typed={typed ?? schemeAsTyped(chosen.name, chosen.scheme)}
					errorOf={errorOf}
				/>
			) : (
				<>
					<SchemeList schemes={schemes} templates={schemeTemplates} />
					<LotCodeForm
						pattern={typed?.pattern?.[0] ?? settings.lotCodePattern}
						days={typed?.days?.[0] ?? String(settings.bestBeforeDays)}
						errorOf={errorOf}
					/>
				</>
			)}
		</DeskBook>
	)
}
