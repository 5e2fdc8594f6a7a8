import { type FormEvent, useEffect, useRef, useState } from "react"
import { type Day, dayInZone } from "~/domain/calendar"
import { judgeCheck, NOTE_LENGTH } from "~/domain/crop/check-rules"
import { layoutOf } from "~/domain/crop/check-sections"
import { Button } from "~/ui/forms/button"
import { FieldError } from "~/ui/forms/field-error"
import { TextField } from "~/ui/forms/fields"
import { CheckPercent } from "./check-percent"
import { CheckRows } from "./check-rows"
import { CHECK_FIELDS, type CheckErrors, type CheckFields, fieldWords, PHOTO_WORDS, typedCheckOf } from "./check-words"
import { type CheckedSuper, type KeptCheck, newCheckId } from "./kept-checks-store"

const PHOTO_TYPES = ["image/jpeg", "image/png", "image/webp"]
const PHOTO_BYTES = 10_000_000

/** Who looks, for whom, and when it is there. */
export type CheckPlace = {
	producer: string
	zone: string
	today: Day
	person: { id: string; name: string }
}

export type CheckFormProps = {
	/** Begins the ids of its fields, since a page has many such forms. */
	id: string
	place: CheckPlace
	about: CheckedSuper
	checkId: string
	/** The shares of the last check, where the buttons begin. */
	last: { filledPercent: number; cappedPercent: number } | null
	fields?: CheckFields
	errors?: CheckErrors
	/** The photo that is kept with it already, when a kept check is mended. */
	photo?: KeptCheck["photo"]
	/** Writes it down on this phone. Where that fails, the form is posted as without script. */
	onKeep: (check: KeptCheck) => Promise<void>
	submitLabel?: string
}

/**
 * A look into one super: by rows or by shares, with a note, a photo and its day. Without script it posts itself. With it,
 * what cannot be right is said at once, and the rest is written down on the phone first, under the form's id, and sent
 * from there.
 */
export function CheckForm({ id, place, about, last, photo = null, onKeep, submitLabel, ...given }: CheckFormProps) {
	const [checkId, setCheckId] = useState(given.checkId)
	const [errors, setErrors] = useState(given.errors ?? [])
	const [round, setRound] = useState(0)
	const isLeaving = useRef(false)
	const layout = layoutOf(about.capacityPieces)
	const { fields } = given

	const submit = async (event: FormEvent<HTMLFormElement>) => {
		if (isLeaving.current) return
		event.preventDefault()
		const form = event.currentTarget
		const check = await readCheck(form, { place, about, checkId, photo })
		if ("errors" in check) {
			setErrors(check.errors)
			document.getElementById(`${id}-${check.errors[0]?.field}`)?.focus()
			return
		}
		setErrors([])
		try {
			await onKeep(check)
			setCheckId(newCheckId())
			setRound((before) => before + 1)
		} catch {
			isLeaving.current = true
			form.requestSubmit()
		}
	}
	return (
		<form className="check-form" method="post" encType="multipart/form-data" noValidate onSubmit={submit}>
			<input type="hidden" name="checkId" value={checkId} />
			<input type="hidden" name="superId" value={about.id} />
			<input type="hidden" name="madeBy" value={place.person.id} />
			<CheckFieldsets
				key={round}
				formId={id}
				{...{ place, last, errors, photo, layout, fields: round === 0 ? fields : undefined }}
			/>
			<Button variant="primary" size="big" id={`${id}-submit`}>
				{submitLabel ?? "Record the check"}
			</Button>
		</form>
	)
}

type FieldsetsProps = Pick<CheckFormProps, "place" | "last" | "fields" | "photo"> & {
	formId: string
	errors: CheckErrors
	layout: ReturnType<typeof layoutOf>
}

function CheckFieldsets({ formId, place, last, fields = {}, errors, photo, layout }: FieldsetsProps) {
	const id = (field: string) => `${formId}-${field}`
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const day = useToday(place, fields.checkedOn)
	const by = fields.by ?? (layout ? "rows" : "shares")
	return (
		<>
			{layout ? (
				<fieldset className="check-by">
					<legend className="sr-only">How to note it</legend>
					<label>
						<input type="radio" name="by" value="rows" defaultChecked={by === "rows"} /> By rows
					</label>
					<label>
						<input type="radio" name="by" value="shares" defaultChecked={by === "shares"} /> By shares
					</label>
				</fieldset>
			) : (
				<input type="hidden" name="by" value="shares" />
			)}
			{layout && (
				<CheckRows
					id={formId}
					across={layout.across}
					values={[fields.row1 ?? "", fields.row2 ?? "", fields.row3 ?? "", fields.row4 ?? ""]}
					error={errorOf("rows")}
				/>
			)}
			<div className="check-shares">
				<CheckPercent
					id={id("filled")}
					name="filled"
					label="Share filled"
					defaultValue={fields.filled ?? ""}
					from={last?.filledPercent ?? 0}
					error={errorOf("filled")}
				/>
				<CheckPercent
					id={id("capped")}
					name="capped"
					label="Share capped"
					defaultValue={fields.capped ?? ""}
					from={last?.cappedPercent ?? 0}
					error={errorOf("capped")}
				/>
			</div>
			<TextField
				ref={day}
				id={id("checkedOn")}
				name="checkedOn"
				label="Day of the check"
				type="date"
				defaultValue={fields.checkedOn ?? place.today}
				error={errorOf("checkedOn")}
			/>
			<div className="field">
				<label className="field-label" htmlFor={id("note")}>
					Note
				</label>
				<textarea
					className="input"
					id={id("note")}
					name="note"
					rows={2}
					maxLength={NOTE_LENGTH}
					defaultValue={fields.note ?? ""}
					aria-invalid={errorOf("note") ? true : undefined}
					aria-describedby={errorOf("note") && `${id("note")}-error`}
				/>
				{errorOf("note") && <FieldError id={`${id("note")}-error`}>{errorOf("note")}</FieldError>}
			</div>
			<TextField
				id={id("photo")}
				name="photo"
				label="Photo"
				hint={photo ? `${photo.name} is kept with it; another takes its place.` : "JPEG, PNG or WebP, up to 10 MB."}
				type="file"
				accept={PHOTO_TYPES.join(",")}
				error={errorOf("photo")}
			/>
		</>
	)
}

/** Sets a day field to the day it is now: a page that was kept for days still says the day it was made on. */
function useToday({ zone, today }: CheckPlace, chosen: string | undefined) {
	const day = useRef<HTMLInputElement>(null)
	useEffect(() => {
		const now = dayInZone(new Date(), zone)
		if (!chosen && day.current?.value === today && now !== today) day.current.value = now
	}, [zone, today, chosen])
	return day
}

/** The form as it is written down on the phone, or what is wrong with it. */
async function readCheck(
	form: HTMLFormElement,
	given: { place: CheckPlace; about: CheckedSuper; checkId: string; photo: KeptCheck["photo"] },
): Promise<KeptCheck | { errors: CheckErrors }> {
	const { place, about, checkId } = given
	const posted = new FormData(form)
	const fields: CheckFields = {}
	for (const name of CHECK_FIELDS) fields[name] = String(posted.get(name) ?? "")
	const today = dayInZone(new Date(), place.zone)
	const judged = judgeCheck(typedCheckOf(fields), { ...about, today })
	const across = layoutOf(about.capacityPieces)?.across ?? null
	const errors: CheckErrors = judged.ok
		? []
		: judged.refused.map((one) => ({ field: one.field, message: fieldWords(one, { ...about, today, across }) }))
	const file = posted.get("photo")
	const photo = file instanceof File && file.size > 0 ? file : null
	if (photo && photo.size > PHOTO_BYTES) errors.push({ field: "photo", message: PHOTO_WORDS["photo-too-heavy"] })
	else if (photo && !PHOTO_TYPES.includes(photo.type)) {
		errors.push({ field: "photo", message: PHOTO_WORDS["photo-of-other-type"] })
	}
	if (errors.length > 0 || !judged.ok) return { errors }
	return {
		id: checkId,
		producer: place.producer,
		madeBy: place.person,
		about,
		fields,
		seen: judged.check,
		photo: photo ? { bytes: await photo.arrayBuffer(), type: photo.type, name: photo.name } : given.photo,
		keptAt: Date.now(),
		refused: null,
	}
}
