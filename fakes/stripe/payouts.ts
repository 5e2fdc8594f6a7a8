import type Stripe from "stripe"
import { z } from "zod"
import { noSuch } from "./errors"
import { fromPage } from "./events"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { page } from "./lists"
import { expandable, paging, paramsOf, readParams } from "./params"
import type { Endpoints } from "./router"

/**
 * Pays out all that no payout has taken yet, whether or not its two days are over, and says so (payout.created,
 * payout.paid). Answers undefined when there is nothing above zero to pay out.
 */
export function makePayout(fake: Fake): Stripe.Payout | undefined {
	const taken = new Set([...fake.store.payoutParts.values()].flat())
	const parts = [...fake.store.balanceTransactions.values()].filter(
		({ id, type }) => !taken.has(id) && type !== "payout",
	)
	const amount = parts.reduce((sum, { net }) => sum + net, 0)
	if (amount <= 0) return undefined
	const payout: Stripe.Payout = {
		id: newId("po"),
		object: "payout",
		amount,
		application_fee: null,
		application_fee_amount: null,
		arrival_date: fake.seconds(),
		automatic: true,
		balance_transaction: null,
		created: fake.seconds(),
		currency: "usd",
		description: "STRIPE PAYOUT",
		destination: null,
		failure_balance_transaction: null,
		failure_code: null,
		failure_message: null,
		livemode: false,
		metadata: {},
		method: "standard",
		original_payout: null,
		payout_method: null,
		reconciliation_status: "completed",
		reversed_by: null,
		source_type: "card",
		statement_descriptor: null,
		status: "paid",
		trace_id: null,
		type: "bank_account",
	}
	for (const part of parts) part.status = "available"
	fake.store.payouts.set(payout.id, payout)
	fake.store.payoutParts.set(
		payout.id,
		parts.map(({ id }) => id),
	)
	fake.events.emit("payout.created", payout, fromPage)
	fake.events.emit("payout.paid", payout, fromPage)
	return payout
}

const listSchema = paramsOf<Stripe.PayoutListParams>()({ ...paging, status: z.string().optional() })

export const payoutEndpoints: Endpoints = {
	"GET /v1/payouts": ({ fake, form }) => {
		const { status, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.payouts.values()].filter((row) => status === undefined || row.status === status)
		return page(rows, "/v1/payouts", rest)
	},
	"GET /v1/payouts/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		const payout = fake.store.payouts.get(id)
		if (!payout) throw noSuch("payout", id)
		return payout
	},
}
