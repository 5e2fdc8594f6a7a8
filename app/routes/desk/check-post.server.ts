import { randomUUID } from "node:crypto"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { layoutOf } from "~/domain/crop/check-sections"
import { now as askClock } from "~/platform/clock.server"
import { findSuper } from "~/services/crop/find-super.server"
import { recordCheck } from "~/services/crop/record-check.server"
import { PHOTO_BYTES, reencodePhoto } from "~/services/uploads/reencode-photo.server"
import {
	CHECK_FIELDS,
	CHECK_WORDS,
	type CheckErrors,
	type CheckFields,
	fieldWords,
	PHOTO_WORDS,
	typedCheckOf,
} from "~/ui/crop/check-words"
import type { DeskScope } from "../guard.server"

const sent = z.object({ checkId: z.guid(), superId: z.guid(), madeBy: z.guid() })

/** What became of a posted check. `newId` is there where pressing again must record another check. */
export type TakenCheck =
	| { ok: true; superId: string }
	| { ok: false; superId: string | null; fields: CheckFields; errors: CheckErrors; newId: string | null }

/**
 * Takes a posted check, from a form or from what a phone has kept: reads it, draws its photo anew and records it. All that
 * is wrong is answered in words, with what was typed; a photo is named as one to choose again.
 */
export async function takeCheck(form: FormData, scope: DeskScope): Promise<TakenCheck> {
	const fields: CheckFields = {}
	for (const name of CHECK_FIELDS) fields[name] = String(form.get(name) ?? "")
	const ids = sent.safeParse(Object.fromEntries(form))
	const refuse = (errors: CheckErrors, newId: string | null = null): TakenCheck => ({
		ok: false,
		superId: ids.success ? ids.data.superId : null,
		fields,
		errors,
		newId,
	})
	if (!ids.success) return refuse([{ message: CHECK_WORDS.unreadable }])
	if (ids.data.madeBy !== scope.person.id) return refuse([{ message: CHECK_WORDS["other-account"] }])
	const file = form.get("photo")
	const photo = file instanceof File && file.size > 0 ? await readPhoto(file) : null
	if (photo?.ok === false) return refuse([{ field: "photo", message: PHOTO_WORDS[photo.reason] }])

	const { producer, person } = scope
	const now = askClock()
	const { checkId, superId } = ids.data
	const recorded = await recordCheck({
		producerId: producer.id,
		personId: person.id,
		zone: producer.timeZone,
		now,
		checkId,
		superId,
		typed: typedCheckOf(fields),
		photo: photo?.photo ?? null,
	})
	if (recorded.ok) return { ok: true, superId }
	switch (recorded.reason) {
		case "no-super":
			return refuse([{ message: CHECK_WORDS["no-super"] }])
		case "super-off":
			return refuse([{ message: CHECK_WORDS["super-off"](recorded.offOn) }])
		case "other-check-recorded":
			return refuse([{ message: CHECK_WORDS["other-check-recorded"] }], randomUUID())
	}
	const facts = await findSuper({ producerId: producer.id, superId })
	if (!facts) return refuse([{ message: CHECK_WORDS["no-super"] }])
	const shown = {
		setOn: facts.setOn,
		today: dayInZone(now, producer.timeZone),
		across: layoutOf(facts.capacityPieces)?.across ?? null,
	}
	const errors: CheckErrors = recorded.refused.map((one) => ({ field: one.field, message: fieldWords(one, shown) }))
	if (photo) errors.push({ field: "photo", message: "Choose the photo again: a page cannot keep it." })
	return refuse(errors)
}

/** What was posted; nothing where it came in pieces, which is then said to be unreadable. */
export const postedForm = (request: Request): Promise<FormData> => request.formData().catch(() => new FormData())

/** A file over the limit is not even read. */
async function readPhoto(file: File) {
	if (file.size > PHOTO_BYTES) return { ok: false, reason: "photo-too-heavy" } as const
	return reencodePhoto(new Uint8Array(await file.arrayBuffer()))
}
