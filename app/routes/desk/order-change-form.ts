import { casesWords, parseCases } from "~/domain/quantity"
import type { ChangeableLine } from "~/services/orders/find-proposal.server"
import type { AskedChange } from "~/services/orders/propose-change.server"
import { centsOf } from "./payment-form"

const MAX_REASON = 500
/** A case dearer than this is a slip of the hand. */
const MOST_CENTS = 10_000_000

/** A late change as it was typed, and what it means; `errors` by field name. */
export type PostedChange = {
	values: Record<string, string>
	errors: Record<string, string>
	reason: string
	changes: AskedChange[]
}

/** Reads a late change to these lines. Nothing is rounded or guessed; the reason must be given. */
export function readLateChange(form: FormData, lines: readonly ChangeableLine[]): PostedChange {
	const values: Record<string, string> = {}
	const errors: Record<string, string> = {}
	const typed = (field: string) => {
		values[field] = String(form.get(field) ?? "").slice(0, 2000)
		return values[field].trim()
	}
	const reason = typed("change-reason")
	if (reason === "") errors["change-reason"] = "Write why, in a sentence the store will read."
	else if (reason.length > MAX_REASON) errors["change-reason"] = `Shorten the reason to ${MAX_REASON} characters.`
	const changes = lines.flatMap((line): AskedChange[] => {
		const casesField = `cases-${line.lineId}`
		const priceField = `price-${line.lineId}`
		const cases = readCases(typed(casesField), line.askedCases)
		if (!cases.ok) errors[casesField] = cases.message
		const price = line.isWeighed ? { ok: true as const, cents: line.caseCents } : readPrice(typed(priceField))
		if (!price.ok) errors[priceField] = price.message
		if (!cases.ok || !price.ok) return []
		return [{ lineId: line.lineId, cases: cases.cases, caseCents: price.cents }]
	})
	return { values, errors, reason, changes }
}

function readCases(text: string, askedCases: number): { ok: true; cases: number } | { ok: false; message: string } {
	if (text === "") return { ok: false, message: "Write how many cases it gets, 0 for none." }
	const read = parseCases(text)
	if (!read.ok) return { ok: false, message: read.message }
	if (read.cases > askedCases)
		return { ok: false, message: `That is more than was asked for: ${casesWords(askedCases)}.` }
	return read
}

function readPrice(text: string): { ok: true; cents: number } | { ok: false; message: string } {
	const cents = centsOf(text)
	if (cents === null) return { ok: false, message: "Write what a case costs, such as 114.00." }
	if (cents > MOST_CENTS) return { ok: false, message: "That is more than a case can cost. Look at the figure again." }
	return { ok: true, cents }
}
