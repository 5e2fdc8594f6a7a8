import { data } from "react-router"
import { dayInZone } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { now as askClock } from "~/platform/clock.server"
import { type BounceAnswer, bouncePayment } from "~/services/payments/bounce-payment.server"
import { type RefundAnswer, refundPayment } from "~/services/payments/refund-payment.server"
import type { DeskScope } from "../guard.server"
import { BOOKS_CLOSED, bounceForm, fieldErrors, refundForm, typedIn } from "./payment-form"

type Refused = {
	intent: "refund" | "bounce"
	errors: { field?: string; message: string }[]
	values: Record<string, string>
}
type Step = { ok: true; done: string } | { ok: false; refused: Refused }

/** Does what the form of a payment's page asks: give part of it back, or note that it did not hold. */
export function takePaymentStep(form: FormData, paymentId: string, scope: DeskScope): Promise<Step> {
	const intent = form.get("intent")
	if (intent === "refund") return takeRefund(form, paymentId, scope)
	if (intent === "bounce") return takeBounce(form, paymentId, scope)
	throw data(null, { status: 400 })
}

const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

const DONE = { answered: "refunded", "no-answer": "refund-asked" } as const

function requireId(paymentId: string): void {
	if (!uuid.test(paymentId)) throw data(null, { status: 404 })
}

async function takeRefund(form: FormData, paymentId: string, { producer, person }: DeskScope): Promise<Step> {
	requireId(paymentId)
	const values = typedIn(form, ["amount", "reason", "returnId"])
	const parsed = refundForm.safeParse(values)
	if (!parsed.success) {
		const errors = fieldErrors(parsed.error)
		if (errors.some(({ field }) => field === "returnId")) throw data(null, { status: 400 })
		return { ok: false, refused: { intent: "refund", errors, values } }
	}
	const { amount, reason, returnId } = parsed.data
	const answer = await refundPayment({
		...{ producerId: producer.id, paymentId, returnId, amountCents: amount, reason, personId: person.id },
		today: dayInZone(askClock(), producer.timeZone),
	})
	if (answer.ok && answer.state !== "refused") return { ok: true, done: DONE[answer.state] }
	const error = answer.ok
		? { message: "Stripe refuses this refund. Look at the payment there." }
		: refundProblem(answer)
	return { ok: false, refused: { intent: "refund", errors: [error], values } }
}

function refundProblem(answer: Exclude<RefundAnswer, { ok: true }>): { field?: string; message: string } {
	switch (answer.reason) {
		case "too-much":
			return {
				field: "amount",
				message: `No more than ${formatMoney(answer.leftCents)} of it can go back: the rest has gone back already.`,
			}
		case "not-by-stripe":
			return { message: "Only what came through Stripe and has arrived can go back through it." }
		case "no-such-payment":
			throw data(null, { status: 404 })
	}
}

async function takeBounce(form: FormData, paymentId: string, { producer, person }: DeskScope): Promise<Step> {
	requireId(paymentId)
	const values = typedIn(form, ["bouncedOn", "note"])
	const parsed = bounceForm(dayInZone(askClock(), producer.timeZone)).safeParse(values)
	if (!parsed.success) return { ok: false, refused: { intent: "bounce", errors: fieldErrors(parsed.error), values } }
	const answer = await bouncePayment({ producerId: producer.id, paymentId, personId: person.id, ...parsed.data })
	if (answer.ok) return { ok: true, done: "bounced" }
	return { ok: false, refused: { intent: "bounce", errors: [bounceProblem(answer)], values } }
}

function bounceProblem(answer: Exclude<BounceAnswer, { ok: true }>): { field?: string; message: string } {
	switch (answer.reason) {
		case "books-closed":
			return { field: "bouncedOn", message: BOOKS_CLOSED }
		case "before-it-came":
			return { field: "bouncedOn", message: "It cannot bounce before it came." }
		case "gone-already":
			return { message: "It has gone back already." }
		case "by-stripe":
			return { message: "What came through Stripe is returned by the bank; it shows here by itself." }
		case "no-such-payment":
			throw data(null, { status: 404 })
	}
}
