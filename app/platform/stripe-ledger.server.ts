import type Stripe from "stripe"
import { stripe } from "./stripe.server"

const AT_ONCE = 100

const seconds = (at: Date) => Math.floor(at.getTime() / 1000)
const idOf = (one: string | { id: string } | null | undefined) => (typeof one === "string" ? one : (one?.id ?? null))

/** An event as Stripe lists it. */
export type ListedEvent = { id: string; type: string; isLive: boolean; payload: Record<string, unknown> }

/** Every event since a moment, the earlier first. Stripe keeps them for thirty days. Throws when it does not answer. */
export async function listEvents(since: Date): Promise<ListedEvent[]> {
	const events: ListedEvent[] = []
	for await (const event of stripe().events.list({ created: { gte: seconds(since) }, limit: AT_ONCE })) {
		events.push({ id: event.id, type: event.type, isLive: event.livemode, payload: { ...event } })
	}
	return events.reverse()
}

/** A payment as the list of them has it. `returnedCents` are refunds; disputes are found when it is looked at. */
export type ListedIntent = {
	intentId: string
	metadata: Record<string, string>
	status: "paid" | "on-its-way" | "not-paid"
	amountCents: number
	returnedCents: number
	isDisputed: boolean
}

/** Every payment that was made since a moment. Throws when Stripe does not answer. */
export async function listIntents(since: Date): Promise<ListedIntent[]> {
	const intents: ListedIntent[] = []
	const params = { created: { gte: seconds(since) }, limit: AT_ONCE, expand: ["data.latest_charge"] }
	for await (const intent of stripe().paymentIntents.list(params)) intents.push(listed(intent))
	return intents
}

function listed(intent: Stripe.PaymentIntent): ListedIntent {
	const charge = intent.latest_charge && typeof intent.latest_charge !== "string" ? intent.latest_charge : null
	const isPaid = intent.status === "succeeded"
	return {
		intentId: intent.id,
		metadata: intent.metadata,
		status: isPaid ? "paid" : intent.status === "processing" ? "on-its-way" : "not-paid",
		amountCents: isPaid ? intent.amount_received : intent.amount,
		returnedCents: charge?.amount_refunded ?? 0,
		isDisputed: charge?.disputed ?? false,
	}
}

/** Ids of the payouts that arrived since a moment. Throws when Stripe does not answer. */
export async function listPayouts(since: Date): Promise<string[]> {
	const ids: string[] = []
	for await (const payout of stripe().payouts.list({
		created: { gte: seconds(since) },
		status: "paid",
		limit: AT_ONCE,
	})) {
		ids.push(payout.id)
	}
	return ids
}

/** One entry of a payout: so much for one payment, less the fee. `isCharge`: the payment itself, no refund or dispute. */
export type PayoutEntry = { intentId: string; isCharge: boolean; grossCents: number; feeCents: number }

/** What a payout brought and what it is made of; null while it has not been paid. Throws when Stripe does not answer. */
export async function findPayout(payoutId: string): Promise<{ arrivedOn: string; entries: PayoutEntry[] } | null> {
	const payout = await stripe().payouts.retrieve(payoutId)
	if (payout.status !== "paid") return null
	const entries: PayoutEntry[] = []
	const params = { payout: payoutId, limit: AT_ONCE, expand: ["data.source"] }
	for await (const { amount, fee, source, type } of stripe().balanceTransactions.list(params)) {
		const intentId = intentOf(source)
		if (!intentId) continue
		entries.push({ intentId, isCharge: type === "charge" || type === "payment", grossCents: amount, feeCents: fee })
	}
	// Stripe dates an arrival by midnight UTC.
	return { arrivedOn: new Date(payout.arrival_date * 1000).toISOString().slice(0, 10), entries }
}

function intentOf(source: Stripe.BalanceTransaction["source"]): string | null {
	if (!source || typeof source === "string" || !("payment_intent" in source)) return null
	return idOf(source.payment_intent)
}

/** Whose a payment is, as it was written into it; null for one that is none of ours. */
export async function findIntentMetadata(intentId: string): Promise<Record<string, string>> {
	return (await stripe().paymentIntents.retrieve(intentId)).metadata
}
