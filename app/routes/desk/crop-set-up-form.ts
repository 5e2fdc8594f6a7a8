import { z } from "zod"
import { type Day, isDay } from "~/domain/calendar"
import { LONGEST_ROW } from "~/domain/crop/hive-labels"

/** What is wrong with a form: at a field, or as a whole. */
export type FormError = { field?: string; message: string }

const words = (most: number, missing: string) =>
	z.string().trim().min(1, missing).max(most, `Shorten it to ${most} characters.`)

/** A whole number of a field, refused in words. */
export const wholeNumber = (least: number, most: number, message: string) =>
	z
		.string()
		.trim()
		.regex(/^\d{1,6}$/, message)
		.transform(Number)
		.refine((number) => number >= least && number <= most, message)

const chosen = z.array(z.guid()).min(1, "Choose at least one in the list.")
const day: z.ZodType<Day> = z.string().refine(isDay, "Choose a day.")

export const yardForm = z.object({
	name: words(80, "Write the yard's name."),
	flora: z.string().trim().max(120, "Shorten it to 120 characters."),
})

export const hivesForm = z.object({
	yardId: z.guid("Choose a yard of the list."),
	firstLabel: words(20, "Write what is painted on the first hive, such as 12."),
	count: wholeNumber(1, LONGEST_ROW, `Write how many hives, from 1 to ${LONGEST_ROW}.`),
})

/** One super for each chosen hive. */
export const supersForm = z.object({
	hives: chosen,
	productId: z.guid("Choose what its sections are for."),
	capacityPieces: wholeNumber(1, 400, "Write how many pieces a super holds, from 1 to 400."),
	setOn: day,
	idempotencyKey: z.uuid("Open the page again and send the form once more."),
})

/** The day on which many supers were marked. */
export const marksForm = z.object({ on: day })

/** What a refused form says, each error at its field. */
export function errorsOf(error: z.ZodError): FormError[] {
	return error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
}

/** The plain values that stand in a form when it comes back, and what was chosen in it. */
export type Typed = { values: Record<string, string>; chosen: string[] }

/** What was typed and chosen, to be shown again. `list` is the name of the boxes. */
export function typedIn(form: FormData, list: string): Typed {
	const values = Object.fromEntries(
		[...form.entries()].flatMap(([name, value]) => (name !== list && typeof value === "string" ? [[name, value]] : [])),
	)
	return { values, chosen: form.getAll(list).map(String) }
}
