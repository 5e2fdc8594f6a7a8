import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { readCropSettings } from "~/services/crop/find-board.server"
import { setCropSettings } from "~/services/crop/set-crop-settings.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { MarginNote, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/crop-settings"
import { errorsOf, typedIn, wholeNumber } from "./crop-set-up-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Crop settings · Waxbill" }]

const settingsForm = z.object({
	readyCappedPercent: wholeNumber(1, 100, "Write a share from 1 to 100 %."),
	figure: z.enum(["low", "likely"], "Choose one of the two figures."),
})

export const loader = guard(admits.desk("owner"), async ({ url }: Route.LoaderArgs, scope) => ({
	frame: await findDeskFrame(scope, { part: "crop" }),
	...(await readCropSettings(scope.producer.id)),
	isSaved: url.searchParams.has("saved"),
}))

export const action = guard(admits.desk("owner"), async ({ request, url }: Route.ActionArgs, { producer, person }) => {
	const form = await request.formData()
	const parsed = settingsForm.safeParse(Object.fromEntries(form))
	if (!parsed.success) return data({ errors: errorsOf(parsed.error), typed: typedIn(form, "") }, { status: 422 })
	await setCropSettings({
		producerId: producer.id,
		personId: person.id,
		today: dayInZone(askClock(), producer.timeZone),
		...parsed.data,
	})
	throw redirect(`${url.pathname}?saved`)
})

export default function CropSettings({ loaderData, actionData, params }: Route.ComponentProps) {
	const errors = actionData?.errors ?? []
	const values: Record<string, string> = actionData?.typed.values ?? {}
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Crop settings"
				lead={
					<>
						When a super is ready, and how much of the crop can be promised before it is off the hives.{" "}
						<Link to={`/desk/${params.producer}/crop`}>Back to the board</Link>
					</>
				}
			/>
			<ErrorSummary errors={errors} title="Nothing was saved" />
			{loaderData.isSaved && errors.length === 0 && (
				<MessageLine tone="saved" title="Saved.">
					What should come off is worked out anew.
				</MessageLine>
			)}
			<Form method="post" className="grid max-w-xl gap-5 px-4 py-4 desk:px-8" noValidate>
				<TextField
					name="readyCappedPercent"
					label="A super is ready when so much of it is capped, in %"
					hint="90 at first: common practice in the trade."
					inputMode="numeric"
					defaultValue={values.readyCappedPercent ?? String(loaderData.readyCappedPercent)}
					error={errorOf("readyCappedPercent")}
				/>
				<SelectField
					name="figure"
					label="Of the crop, count as supply"
					options={[
						{ value: "low", label: "the low figure" },
						{ value: "likely", label: "the likely figure" },
					]}
					defaultValue={values.figure ?? loaderData.figure}
					error={errorOf("figure")}
				/>
				<MarginNote>Eight supers in ten come to the low figure or more, five in ten to the likely one.</MarginNote>
				<div>
					<Button variant="primary">Save the settings</Button>
				</div>
			</Form>
		</DeskBook>
	)
}
