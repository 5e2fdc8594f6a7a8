import type Stripe from "stripe"
import { z } from "zod"
import { dollars } from "./amounts"
import { recordRefund, recordRefundFailure } from "./balance"
import { getCharge } from "./charges"
import { invalidRequest, noSuch, unexpectedState } from "./errors"
import { fromPage } from "./events"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { page } from "./lists"
import { expandable, integer, mergeMetadata, metadata, paging, paramsOf, readParams } from "./params"
import { getIntent } from "./payment-intents"
import type { Endpoints } from "./router"

const createSchema = paramsOf<Stripe.RefundCreateParams>()({
	...expandable,
	payment_intent: z.string().optional(),
	charge: z.string().optional(),
	amount: integer.optional(),
	reason: z.enum(["duplicate", "fraudulent", "requested_by_customer"]).optional(),
	metadata: metadata.optional(),
})
const listSchema = paramsOf<Stripe.RefundListParams>()({
	...paging,
	payment_intent: z.string().optional(),
	charge: z.string().optional(),
})

function chargeToRefund(fake: Fake, given: { payment_intent?: string | undefined; charge?: string | undefined }) {
	if (given.charge !== undefined) return getCharge(fake, given.charge, "charge")
	if (given.payment_intent === undefined) {
		throw invalidRequest("One of the following params should be provided for this request: payment_intent or charge.")
	}
	const intent = getIntent(fake, given.payment_intent, "payment_intent")
	if (intent.status !== "succeeded") {
		throw unexpectedState(`This PaymentIntent (${intent.id}) does not have a successful charge to refund.`, intent)
	}
	return getCharge(fake, String(intent.latest_charge))
}

/** The cents to give back: what was asked, or all that is left. Refuses more than is left, nothing, or a second whole. */
function amountToRefund(charge: Stripe.Charge, asked: number | undefined): number {
	const left = charge.amount_captured - charge.amount_refunded
	if (!charge.captured || charge.status !== "succeeded") {
		throw invalidRequest(`Charge ${charge.id} has not been captured and cannot be refunded.`, {
			code: "charge_not_refundable",
		})
	}
	if (charge.refunded) {
		throw invalidRequest(`Charge ${charge.id} has already been refunded.`, { code: "charge_already_refunded" })
	}
	const amount = asked ?? left
	if (amount < 1) {
		throw invalidRequest("This value must be greater than or equal to 1.", {
			code: "parameter_invalid_integer",
			param: "amount",
		})
	}
	if (amount > left) {
		const what = charge.amount_refunded > 0 ? "unrefunded amount on charge" : "charge amount"
		throw invalidRequest(`Refund amount (${dollars(amount)}) is greater than ${what} (${dollars(left)})`, {
			param: "amount",
		})
	}
	return amount
}

/** The bank's answer to a refund: it arrived, or it did not and the money is back on the balance (refund.failed). */
export function settleRefund(fake: Fake, refund: Stripe.Refund, outcome: "succeeded" | "failed"): void {
	if (refund.status === "failed" || (outcome === "succeeded" && refund.status !== "pending")) {
		throw invalidRequest(`Refund ${refund.id} is settled already.`)
	}
	refund.status = outcome
	if (outcome === "failed") {
		refund.failure_reason = "expired_or_canceled_card"
		recordRefundFailure(fake, refund)
		const charge = getCharge(fake, String(refund.charge))
		charge.amount_refunded -= refund.amount
		charge.refunded = false
	}
	fake.events.emit("refund.updated", refund, fromPage)
	if (outcome === "failed") fake.events.emit("refund.failed", refund, fromPage)
}

/** The refund named `id`; refuses with 404 `resource_missing`. */
export function getRefund(fake: Fake, id: string): Stripe.Refund {
	const refund = fake.store.refunds.get(id)
	if (!refund) throw noSuch("refund", id)
	return refund
}

export const refundEndpoints: Endpoints = {
	"POST /v1/refunds": ({ fake, form, cause }) => {
		const given = readParams(createSchema, form)
		const charge = chargeToRefund(fake, given)
		const amount = amountToRefund(charge, given.amount)
		const isDebit = charge.payment_method_details?.type === "us_bank_account"
		const refund: Stripe.Refund = {
			id: newId("re"),
			object: "refund",
			amount,
			balance_transaction: null,
			charge: charge.id,
			created: fake.seconds(),
			currency: charge.currency,
			customer: charge.customer,
			customer_account: null,
			destination_details: isDebit
				? { type: "us_bank_transfer", us_bank_transfer: { reference: null, reference_status: null } }
				: { type: "card", card: { type: "refund" } },
			metadata: mergeMetadata({}, given.metadata),
			payment_intent: charge.payment_intent,
			payment_method: charge.payment_method,
			reason: given.reason ?? null,
			receipt_number: null,
			source_transfer_reversal: null,
			// A bank takes its days; a card's refund counts at once and may still fail.
			status: isDebit ? "pending" : "succeeded",
			transfer_reversal: null,
		}
		fake.store.refunds.set(refund.id, refund)
		recordRefund(fake, refund)
		charge.amount_refunded += amount
		charge.refunded = charge.amount_refunded === charge.amount_captured
		fake.events.emit("refund.created", refund, cause)
		fake.events.emit("charge.refunded", charge, cause)
		return refund
	},
	"GET /v1/refunds": ({ fake, form }) => {
		const { payment_intent, charge, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.refunds.values()].filter(
			(row) =>
				(payment_intent === undefined || row.payment_intent === payment_intent) &&
				(charge === undefined || row.charge === charge),
		)
		return page(rows, "/v1/refunds", rest)
	},
	"GET /v1/refunds/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		return getRefund(fake, id)
	},
}
