import { casesWords, parseCases } from "~/domain/quantity"
import type { GivenLine } from "~/services/orders/confirm-order.server"

const MAX_REASON = 160

/** What was typed beside the lines of an order, and what it means; `errors` by field name. */
export type PostedConfirmation = {
	values: Record<string, string>
	errors: Record<string, string>
	given: GivenLine[]
}

/** Reads the confirmation of an order with these lines. Nothing is rounded or guessed; an empty figure is refused. */
export function readConfirmation(
	form: FormData,
	lines: readonly { id: string; askedCases: number }[],
): PostedConfirmation {
	const values: Record<string, string> = {}
	const errors: Record<string, string> = {}
	const given = lines.flatMap(({ id, askedCases }): GivenLine[] => {
		const typed = String(form.get(`given-${id}`) ?? "").slice(0, 40)
		const reason = String(form.get(`reason-${id}`) ?? "")
		values[`given-${id}`] = typed
		values[`reason-${id}`] = reason
		if (reason.trim().length > MAX_REASON) errors[`reason-${id}`] = `Shorten the reason to ${MAX_REASON} characters.`
		if (typed.trim() === "") {
			errors[`given-${id}`] = "Write how many cases it gets, 0 for none."
			return []
		}
		const read = parseCases(typed)
		if (!read.ok) {
			errors[`given-${id}`] = read.message
			return []
		}
		if (read.cases > askedCases) {
			errors[`given-${id}`] = `That is more than was asked for: ${casesWords(askedCases)}.`
			return []
		}
		return [{ lineId: id, cases: read.cases, reason: reason.trim() }]
	})
	return { values, errors, given }
}
