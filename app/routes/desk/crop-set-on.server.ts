import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { type SetUpSupersRefusal, setUpSupers } from "~/services/crop/set-up-supers.server"
import type { DeskScope } from "../guard.server"
import { errorsOf, type FormError, supersForm } from "./crop-set-up-form"

/** Reads what the next super is, and sets one on each of the hives. Refusals come back as words at their fields. */
export async function setOnChosen(
	{ producer, person }: DeskScope,
	{ form, hiveIds }: { form: FormData; hiveIds: string[] },
): Promise<{ ok: true; setOn: number } | { ok: false; errors: FormError[] }> {
	const parsed = supersForm.safeParse({ ...Object.fromEntries(form), hives: hiveIds })
	if (!parsed.success) return { ok: false, errors: errorsOf(parsed.error) }
	const { hives, ...next } = parsed.data
	const set = await setUpSupers({
		...next,
		producerId: producer.id,
		personId: person.id,
		today: dayInZone(now(), producer.timeZone),
		hiveIds: hives,
	})
	return set.ok ? set : { ok: false, errors: [REFUSALS[set.reason]] }
}

const REFUSALS: Record<SetUpSupersRefusal["reason"], FormError> = {
	"none-chosen": { message: "Choose at least one hive." },
	gone: { message: "One of these hives is not in use any more. Open the list again and choose anew." },
	"no-such-product": { field: "productId", message: "Choose a product of the list." },
	"in-the-future": { field: "setOn", message: "Choose today or an earlier day." },
	"too-high": { message: "One of these hives has twenty supers on already. Take one off first." },
}
