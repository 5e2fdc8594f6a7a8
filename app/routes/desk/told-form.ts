import type { RecordedPayment } from "~/services/payments/record-payment.server"
import { BOOKS_CLOSED, readAmount, typedIn } from "./payment-form"

type FieldError = { field?: string; message: string }

/** A store with more open invoices than this pays the oldest first. */
const MOST = 500

/** Where a payment goes: an amount for each invoice that has one, where the form says so; else the oldest first. */
export function readTold(form: FormData): {
	isTold: boolean
	parts: { number: string; cents: number }[]
	values: Record<string, string>
	errors: FieldError[]
} {
	const names = [...form.keys()].filter((name) => name.startsWith("told-")).slice(0, MOST)
	const values = typedIn(form, ["goes", ...names])
	const isTold = values.goes === "told"
	if (!isTold) return { isTold, parts: [], values, errors: [] }
	const errors: FieldError[] = []
	const parts = names.flatMap((field) => {
		const text = values[field] ?? ""
		if (text.trim() === "") return []
		const read = readAmount(text, "")
		if ("cents" in read) return [{ number: field.slice("told-".length), cents: read.cents }]
		errors.push({ field, message: read.problem })
		return []
	})
	return { isTold, parts, values, errors }
}

/** Why a payment was not noted, beside the field that it is about. */
export function toldProblem(refused: Exclude<RecordedPayment, { ok: true }>): FieldError {
	switch (refused.reason) {
		case "books-closed":
			return { field: "receivedOn", message: BOOKS_CLOSED }
		case "told-more-than-paid":
			return { field: "amount", message: "The parts are more than what came in." }
		case "told-more-than-open":
			return { field: `told-${refused.number}`, message: `That is more than invoice ${refused.number} has open.` }
		default:
			return { message: "One of these invoices is not here any more. Look again at what is open." }
	}
}
