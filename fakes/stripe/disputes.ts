import type Stripe from "stripe"
import { z } from "zod"
import { recordDispute } from "./balance"
import { invalidRequest, noSuch } from "./errors"
import { fromPage } from "./events"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { page } from "./lists"
import { expandable, paging, paramsOf, readParams } from "./params"
import type { Endpoints } from "./router"

/**
 * The payer's bank takes a charge back. A card's money is withdrawn until the dispute is decided; a debit that the bank
 * returns after it had cleared is a dispute that is lost from the start. Refuses a charge that did not succeed or is
 * disputed already.
 */
export function openDispute(fake: Fake, charge: Stripe.Charge, reason: string): Stripe.Dispute {
	if (charge.status !== "succeeded" || charge.disputed) {
		throw invalidRequest(`Charge ${charge.id} cannot be disputed now.`)
	}
	const isDebit = charge.payment_method_details?.type === "us_bank_account"
	const dispute = {
		id: newId("du"),
		object: "dispute",
		amount: charge.amount_captured - charge.amount_refunded,
		balance_transactions: [],
		charge: charge.id,
		created: fake.seconds(),
		currency: charge.currency,
		enhanced_eligibility_types: [],
		// Stripe answers every kind of evidence as null here until some is handed in.
		evidence: {} as Stripe.Dispute.Evidence,
		evidence_details: {
			due_by: isDebit ? null : fake.seconds() + 7 * 24 * 60 * 60,
			enhanced_eligibility: {},
			has_evidence: false,
			past_due: false,
			submission_count: 0,
		} as Stripe.Dispute.EvidenceDetails,
		intended_submission_method: null,
		is_charge_refundable: false,
		livemode: false,
		metadata: {},
		payment_intent: charge.payment_intent,
		reason,
		status: isDebit ? "lost" : "needs_response",
	} satisfies Stripe.Dispute as Stripe.Dispute
	charge.disputed = true
	fake.store.disputes.set(dispute.id, dispute)
	recordDispute(fake, dispute, false)
	fake.events.emit("charge.dispute.created", dispute, fromPage)
	fake.events.emit("charge.dispute.funds_withdrawn", dispute, fromPage)
	if (isDebit) fake.events.emit("charge.dispute.closed", dispute, fromPage)
	return dispute
}

/** The bank decides a dispute that is open; a won one gives the money back. */
export function closeDispute(fake: Fake, dispute: Stripe.Dispute, outcome: "won" | "lost"): void {
	if (dispute.status !== "needs_response") throw invalidRequest(`Dispute ${dispute.id} is decided already.`)
	dispute.status = outcome
	if (outcome === "won") {
		recordDispute(fake, dispute, true)
		fake.events.emit("charge.dispute.funds_reinstated", dispute, fromPage)
	}
	fake.events.emit("charge.dispute.closed", dispute, fromPage)
}

/** The dispute named `id`; refuses with 404 `resource_missing`. */
export function getDispute(fake: Fake, id: string): Stripe.Dispute {
	const dispute = fake.store.disputes.get(id)
	if (!dispute) throw noSuch("dispute", id)
	return dispute
}

const listSchema = paramsOf<Stripe.DisputeListParams>()({
	...paging,
	charge: z.string().optional(),
	payment_intent: z.string().optional(),
})

export const disputeEndpoints: Endpoints = {
	"GET /v1/disputes": ({ fake, form }) => {
		const { charge, payment_intent, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.disputes.values()].filter(
			(row) =>
				(charge === undefined || row.charge === charge) &&
				(payment_intent === undefined || row.payment_intent === payment_intent),
		)
		return page(rows, "/v1/disputes", rest)
	},
	"GET /v1/disputes/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		return getDispute(fake, id)
	},
}
