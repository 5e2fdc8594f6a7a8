import { z } from "zod"
import { type AccountName, type BookAccountKey, bookAccountKeys } from "~/domain/books/accounts"
import { isDay } from "~/domain/calendar"

export type FieldFault = { field: string; message: string }

const number = z.string().trim().max(20, "Shorten the number to 20 characters.")
const name = z.string().trim().max(120, "Shorten the name to 120 characters.")

/** What was typed for each account; accounts of which nothing was sent are left out. */
export function readAccounts(form: FormData): {
	names: Partial<Record<BookAccountKey, AccountName>>
	typed: Record<string, string>
	errors: FieldFault[]
} {
	const names: Partial<Record<BookAccountKey, AccountName>> = {}
	const typed: Record<string, string> = {}
	const errors: FieldFault[] = []
	for (const account of bookAccountKeys) {
		const given = { number: form.get(`number-${account}`), name: form.get(`name-${account}`) }
		if (typeof given.number !== "string" || typeof given.name !== "string") continue
		typed[`number-${account}`] = given.number.slice(0, 400)
		typed[`name-${account}`] = given.name.slice(0, 400)
		const parsed = z.object({ number, name }).safeParse(given)
		if (parsed.success) names[account] = parsed.data
		else
			errors.push(
				...parsed.error.issues.map(({ path, message }) => ({ field: `${String(path[0])}-${account}`, message })),
			)
	}
	return { names, typed, errors }
}

/** The day until which the books are to be closed. */
export const closingForm = z.object({ until: z.string().refine(isDay, "Choose a day.") })
