import type Stripe from "stripe"
import { z } from "zod"
import { noSuch } from "./errors"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { page } from "./lists"
import { expandable, paging, paramsOf, readParams } from "./params"
import type { Endpoints } from "./router"

const DISPUTE_FEE_CENTS = 1500

/** What Stripe keeps of a charge, in cents: its list prices in the United States, from memory. */
function feeOf(charge: Stripe.Charge): number {
	const type = charge.payment_method_details?.type
	if (type === "us_bank_account") return Math.min(500, Math.round(charge.amount * 0.008))
	if (type === "card_present") return Math.round(charge.amount * 0.027) + 5
	return Math.round(charge.amount * 0.029) + 30
}

function record(
	fake: Fake,
	of: { source: string; amount: number; fee: number; type: Stripe.BalanceTransaction.Type; category: string },
): Stripe.BalanceTransaction {
	const row: Stripe.BalanceTransaction = {
		id: newId("txn"),
		object: "balance_transaction",
		amount: of.amount,
		available_on: fake.seconds() + 2 * 24 * 60 * 60,
		balance_type: "payments",
		created: fake.seconds(),
		currency: "usd",
		description: null,
		exchange_rate: null,
		fee: of.fee,
		fee_details: of.fee
			? [
					{
						amount: of.fee,
						application: null,
						currency: "usd",
						description: "Stripe processing fees",
						type: "stripe_fee",
					},
				]
			: [],
		net: of.amount - of.fee,
		reporting_category: of.category,
		source: of.source,
		status: "pending",
		type: of.type,
	}
	fake.store.balanceTransactions.set(row.id, row)
	return row
}

/** Adds what a charge brought to the balance, less Stripe's fee. */
export function recordBalance(fake: Fake, charge: Stripe.Charge): void {
	const type = charge.payment_method_details?.type === "us_bank_account" ? "payment" : "charge"
	const source = charge.id
	const fee = feeOf(charge)
	charge.balance_transaction = record(fake, {
		source,
		amount: charge.amount_captured,
		fee,
		type,
		category: "charge",
	}).id
}

/** Takes a refund from the balance; fees are not given back. */
export function recordRefund(fake: Fake, refund: Stripe.Refund): void {
	const of = { source: refund.id, amount: -refund.amount, fee: 0, type: "refund" as const, category: "refund" }
	refund.balance_transaction = record(fake, of).id
}

/** Gives a refund that did not arrive back to the balance. */
export function recordRefundFailure(fake: Fake, refund: Stripe.Refund): void {
	const of = {
		source: refund.id,
		amount: refund.amount,
		fee: 0,
		type: "refund_failure" as const,
		category: "refund_failure",
	}
	refund.failure_balance_transaction = record(fake, of).id
}

/** Takes what is disputed from the balance, with the fee for it, or gives both back when it is won. */
export function recordDispute(fake: Fake, dispute: Stripe.Dispute, won: boolean): void {
	const sign = won ? 1 : -1
	const category = won ? "dispute_reversal" : "dispute"
	const of = { source: dispute.id, amount: sign * dispute.amount, type: "adjustment" as const, category }
	dispute.balance_transactions.push(record(fake, { ...of, fee: won ? -DISPUTE_FEE_CENTS : DISPUTE_FEE_CENTS }))
}

const listSchema = paramsOf<Stripe.BalanceTransactionListParams>()({
	...paging,
	payout: z.string().optional(),
	source: z.string().optional(),
	type: z.string().optional(),
})

export const balanceEndpoints: Endpoints = {
	"GET /v1/balance_transactions": ({ fake, form }) => {
		const { payout, source, type, ...rest } = readParams(listSchema, form)
		const parts = payout === undefined ? undefined : new Set(fake.store.payoutParts.get(payout))
		const rows = [...fake.store.balanceTransactions.values()].filter(
			(row) =>
				(parts === undefined || parts.has(row.id)) &&
				(source === undefined || row.source === source) &&
				(type === undefined || row.type === type),
		)
		return page(rows, "/v1/balance_transactions", rest)
	},
	"GET /v1/balance_transactions/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		const row = fake.store.balanceTransactions.get(id)
		if (!row) throw noSuch("balance transaction", id)
		return row
	},
}
