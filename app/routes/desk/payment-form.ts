import { data } from "react-router"
import { z } from "zod"
import { type Day, isDay } from "~/domain/calendar"

/** Ten million dollars: beyond that it is a slip of the hand, and beyond what the database holds in cents. */
const MOST_CENTS = 1_000_000_000

/** Reads money as typed, "929.90", "$1,118" or "42"; null when it is none. Nothing is rounded. */
export function centsOf(text: string): number | null {
	const [, whole, part = ""] = /^\$?\s*(\d{1,3}(?:,\d{3})+|\d{1,12})(?:\.(\d{1,2}))?$/.exec(text.trim()) ?? []
	if (whole === undefined) return null
	return Number(whole.replaceAll(",", "")) * 100 + Number(part.padEnd(2, "0"))
}

/** Money as typed, or the sentence that belongs beside the field. `missing` is said of an empty one. */
export function readAmount(text: string, missing: string): { cents: number } | { problem: string } {
	const cents = centsOf(text)
	if (text.trim() === "") return { problem: missing }
	if (/^\s*[-−–]/.test(text)) return { problem: "A payment cannot be less than nothing." }
	if (cents === null) return { problem: "Write dollars and cents, such as 929.90." }
	if (cents === 0) return { problem: "Write more than nothing." }
	if (cents > MOST_CENTS) return { problem: "That is more than one payment can be. Look at the figure again." }
	return { cents }
}

/** A field for money. */
const amount = (missing: string) =>
	z.string().transform((text, context) => {
		const read = readAmount(text, missing)
		if ("cents" in read) return read.cents
		context.addIssue({ code: "custom", message: read.problem })
		return z.NEVER
	})

/** A day that has begun: nothing is noted ahead of time. */
const pastDay = (today: Day) =>
	z
		.string()
		.refine(isDay, "Choose a day.")
		.refine((day) => day <= today, "That day is still to come.")

/** A payment noted by hand: how it came, how much, on which day, its number or words, and the key made with the form. */
const paymentForm = (today: Day) =>
	z.object({
		method: z.enum(["cheque", "cash", "transfer"], "Choose how it came."),
		amount: amount("Write how much came in."),
		receivedOn: pastDay(today),
		reference: z.string().trim().max(100, "A hundred characters at most."),
		paymentId: z.guid(),
	})

/** A refund through Stripe: how much and why, and the key made with the form. */
export const refundForm = z.object({
	amount: amount("Write how much goes back."),
	reason: z.string().trim().min(3, "Say why it goes back.").max(300, "Three hundred characters at most."),
	returnId: z.guid(),
})

/** A payment by hand that did not hold. */
export const bounceForm = (today: Day) =>
	z.object({
		bouncedOn: pastDay(today),
		note: z.string().trim().min(3, "Say what happened.").max(300, "Three hundred characters at most."),
	})

/** What was typed in these fields, each cut to a length that no honest form reaches. */
export function typedIn(form: FormData, names: readonly string[]): Record<string, string> {
	return Object.fromEntries(names.map((name) => [name, String(form.get(name) ?? "").slice(0, 400)]))
}

export const BOOKS_CLOSED = "The books are closed for that day. Choose a later one, or the first day that is open."

type Refused = { errors: { field: string; message: string }[]; values: Record<string, string> }

/** The sentences beside the fields, from what zod found. */
export function fieldErrors(error: z.ZodError): { field: string; message: string }[] {
	return error.issues.map(({ path, message }) => ({ field: String(path[0]), message }))
}

/** Reads a payment noted by hand; throws 400 for a form that is none of ours. */
export function readPayment(
	form: FormData,
	today: Day,
):
	| { ok: true; payment: z.infer<ReturnType<typeof paymentForm>>; values: Record<string, string> }
	| { ok: false; refused: Refused } {
	const values = typedIn(form, ["method", "amount", "receivedOn", "reference", "paymentId"])
	const parsed = paymentForm(today).safeParse(values)
	if (parsed.success) return { ok: true, payment: parsed.data, values }
	const errors = fieldErrors(parsed.error)
	if (errors.some(({ field }) => field === "paymentId")) throw data(null, { status: 400 })
	return { ok: false, refused: { errors, values } }
}
