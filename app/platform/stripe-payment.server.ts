import Stripe from "stripe"
import { stripe } from "./stripe.server"

/** A refund as it stands at Stripe. `returnId` is ours where it was asked for here. */
export type RefundFacts = {
	stripeId: string
	returnId: string | null
	amountCents: number
	state: "asked" | "done" | "failed"
	at: Date
}

/** A charge that the payer's bank takes back. `isDone`: the money is gone from the balance. */
export type DisputeFacts = {
	stripeId: string
	amountCents: number
	state: "asked" | "done" | "won"
	isLost: boolean
	reason: string
	at: Date
}

/** All that Stripe says of one payment now. */
export type PaymentFacts = {
	intentId: string
	metadata: Record<string, string>
	method: "card" | "bank-debit"
	state: "open" | "on-its-way" | "paid" | "declined" | "expired"
	/** What was asked; what was taken where it is paid. */
	amountCents: number
	/** The moment at which the payer made it, also of a debit that clears days later; null before that. */
	madeAt: Date | null
	/** What Stripe keeps of it; null until known. */
	feeCents: number | null
	/** The bank's reason in words for a person; empty unless declined. */
	declineMessage: string
	refunds: RefundFacts[]
	disputes: DisputeFacts[]
}

/** A way to pay that is kept, and its words: "card ending in 4242". */
export type KeptMethod = { methodId: string; customerId: string; words: string }

const idOf = (one: string | { id: string } | null) => (typeof one === "string" ? one : (one?.id ?? null))
const moment = (seconds: number) => new Date(seconds * 1000)

/** Asks Stripe for the present state of a payment with its refunds and disputes. Throws when it does not answer. */
export async function findPaymentFacts(intentId: string): Promise<PaymentFacts> {
	const intent = await stripe().paymentIntents.retrieve(intentId, { expand: ["latest_charge.balance_transaction"] })
	const charge = intent.latest_charge && typeof intent.latest_charge !== "string" ? intent.latest_charge : null
	const isPaid = intent.status === "succeeded"
	const refunds = isPaid ? await stripe().refunds.list({ payment_intent: intentId, limit: 100 }) : null
	const disputes = charge?.disputed ? await stripe().disputes.list({ payment_intent: intentId, limit: 100 }) : null
	const balance = charge?.balance_transaction
	return {
		intentId,
		metadata: intent.metadata,
		method: isDebit(intent, charge) ? "bank-debit" : "card",
		...stateOf(intent),
		amountCents: isPaid ? intent.amount_received : intent.amount,
		madeAt: charge ? moment(charge.created) : null,
		feeCents: balance && typeof balance !== "string" ? balance.fee : null,
		refunds: (refunds?.data ?? []).map(refundFacts),
		disputes: (disputes?.data ?? []).map(disputeFacts),
	}
}

function isDebit(intent: Stripe.PaymentIntent, charge: Stripe.Charge | null): boolean {
	return (charge?.payment_method_details?.type ?? intent.payment_method_types[0]) === "us_bank_account"
}

function stateOf(intent: Stripe.PaymentIntent): Pick<PaymentFacts, "state" | "declineMessage"> {
	const declineMessage = ""
	if (intent.status === "succeeded") return { state: "paid", declineMessage }
	if (intent.status === "processing") return { state: "on-its-way", declineMessage }
	if (intent.status === "canceled") return { state: "expired", declineMessage }
	const refused = intent.last_payment_error
	if (intent.status === "requires_payment_method" && refused)
		return { state: "declined", declineMessage: refused.message ?? "The bank refused it." }
	return { state: "open", declineMessage }
}

function keptMethod(method: Stripe.PaymentMethod): KeptMethod | null {
	const customerId = idOf(method.customer)
	return customerId ? { methodId: method.id, customerId, words: methodWords(method) } : null
}

function methodWords({ card, us_bank_account: bank }: Stripe.PaymentMethod): string {
	if (card) return `card ending in ${card.last4}`
	return bank?.last4 ? `bank account ending in ${bank.last4}` : "kept way to pay"
}

function refundFacts(refund: Stripe.Refund): RefundFacts {
	const states: Record<string, RefundFacts["state"]> = { succeeded: "done", failed: "failed", canceled: "failed" }
	return {
		stripeId: refund.id,
		returnId: refund.metadata?.return_id ?? null,
		amountCents: refund.amount,
		state: states[refund.status ?? ""] ?? "asked",
		at: moment(refund.created),
	}
}

/** An inquiry takes no money; a dispute does until it is won. */
function disputeFacts(dispute: Stripe.Dispute): DisputeFacts {
	const { status } = dispute
	const isInquiry = status === "warning_needs_response" || status === "warning_under_review"
	const isOver = status === "won" || status === "warning_closed" || status === "prevented"
	return {
		stripeId: dispute.id,
		amountCents: dispute.amount,
		state: isInquiry ? "asked" : isOver ? "won" : "done",
		isLost: status === "lost",
		reason: dispute.reason.replaceAll("_", " "),
		at: moment(dispute.created),
	}
}

/** Asks what came of a visit that has no payment yet, or only keeps a way to pay. Throws when Stripe does not answer. */
export async function findSessionFacts(sessionId: string): Promise<{
	metadata: Record<string, string>
	intentId: string | null
	isExpired: boolean
	kept: KeptMethod | null
}> {
	const session = await stripe().checkout.sessions.retrieve(sessionId, { expand: ["setup_intent.payment_method"] })
	const setup = session.setup_intent
	const method = setup && typeof setup !== "string" && setup.status === "succeeded" ? setup.payment_method : null
	return {
		metadata: session.metadata ?? {},
		intentId: idOf(session.payment_intent),
		isExpired: session.status === "expired",
		kept: method && typeof method !== "string" ? keptMethod(method) : null,
	}
}

/** Whether an error says that Stripe knows no such thing. */
export function isUnknown(error: unknown): boolean {
	return error instanceof Stripe.errors.StripeInvalidRequestError && error.code === "resource_missing"
}
