import { formatMoney } from "~/domain/money"
import type { PaymentStart } from "~/services/payments/start-payment.server"
import { readAmount, typedIn } from "../desk/payment-form"

type FieldError = { field?: string; message: string }
type Typed = { ticked: string[]; values: Record<string, string> }

export type ReadPay = Typed &
	(
		| { ok: true; wishes: { number: string; cents: number }[]; method: "card" | "bank-debit" }
		| { ok: false; errors: FieldError[] }
	)

/** No store ticks more than the page shows. */
const MOST = 200

/** Reads what is ticked, with an amount each, and how it is paid. */
export function readPayForm(form: FormData): ReadPay {
	const ticked = [...new Set(form.getAll("invoice").map(String))].slice(0, MOST)
	const names = [...form.keys()].filter((name) => name.startsWith("cents-")).slice(0, MOST)
	const values = typedIn(form, ["method", ...names])
	const errors: FieldError[] = []
	if (ticked.length === 0) errors.push({ message: "Tick at least one invoice." })
	const wishes = ticked.flatMap((number) => {
		const read = readAmount(values[`cents-${number}`] ?? "", `Write how much you pay of invoice ${number}.`)
		if ("cents" in read) return [{ number, cents: read.cents }]
		errors.push({ field: `cents-${number}`, message: read.problem })
		return []
	})
	const method = values.method === "card" || values.method === "bank-debit" ? values.method : null
	if (!method) errors.push({ message: "Choose how you pay." })
	return errors.length > 0 || !method
		? { ok: false, ticked, values, errors }
		: { ok: true, ticked, values, wishes, method }
}

const PROBLEMS = {
	"nothing-chosen": "Tick at least one invoice.",
	"nothing-open": "One of these invoices is settled already. Look again at what is open.",
	"no-such-invoice": "One of these invoices is not here. Look again at what is open.",
	"too-little": "The payment service takes no less than $0.50 at a time.",
	"under-way":
		"A payment of one of these invoices has been made already and is on its way to us. Look again in a minute.",
	"no-answer":
		"The payment service does not answer. No money was taken, and the invoices stay as they are. Try again in a few minutes.",
} as const

/** Why a payment was not begun, in words, and the status that goes with it. */
export function payRefusal(refused: Exclude<PaymentStart, { ok: true }>): {
	status: number
	problem: string | null
	errors: FieldError[]
} {
	if (refused.reason === "too-much") {
		const { number, payableCents } = refused
		const message =
			payableCents === 0
				? `A payment of invoice ${number} is on its way already: there is nothing more to pay.`
				: `No more than ${formatMoney(payableCents)} is to be paid of invoice ${number}.`
		return { status: 422, problem: null, errors: [{ field: `cents-${number}`, message }] }
	}
	const status = refused.reason === "no-answer" ? 503 : 409
	return { status, problem: PROBLEMS[refused.reason], errors: [] }
}
