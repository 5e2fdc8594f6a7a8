import type Stripe from "stripe"
import type { BankOutcome } from "./banks"
import type { CardOutcome } from "./cards"
import type { Presented } from "./presented"
import { seedReaders } from "./seed"

/** The answer kept for an idempotency key, with what was asked, so that another body under the same key is refused. */
export type KeptAnswer = { fingerprint: string; status: number; body: string; requestId: string; at: number }

/** One try at handing an event to the endpoint. `status` is null when no answer came. */
export type Delivery = { event: string; type: string; status: number | null; at: number }

/** A checkout session keeps its lines and the metadata of the payment to come beside the object that is answered. */
type SessionSecret = {
	lines: Stripe.LineItem[]
	intentMetadata: Record<string, string>
	intentDescription: string | null
	futureUsage: "off_session" | null
	setupMetadata: Record<string, string>
}

/** What comes of charging a kept method, found out when it was typed: its number is never stored. */
export type Behaviour = { card: CardOutcome } | { bank: BankOutcome }

/** The card of a payment that waits for its holder to approve it: what may be kept of a card, and no more. */
export type WaitingCard = { presented: Presented; method: string }

type Tables = {
	customers: Map<string, Stripe.Customer>
	sessions: Map<string, Stripe.Checkout.Session>
	sessionSecrets: Map<string, SessionSecret>
	intents: Map<string, Stripe.PaymentIntent>
	setupIntents: Map<string, Stripe.SetupIntent>
	methods: Map<string, Stripe.PaymentMethod>
	behaviours: Map<string, Behaviour>
	waitingCards: Map<string, WaitingCard>
	charges: Map<string, Stripe.Charge>
	refunds: Map<string, Stripe.Refund>
	disputes: Map<string, Stripe.Dispute>
	balanceTransactions: Map<string, Stripe.BalanceTransaction>
	payouts: Map<string, Stripe.Payout>
	/** The balance transactions of a payout, by its id. */
	payoutParts: Map<string, string[]>
	readers: Map<string, Stripe.Terminal.Reader>
	events: Map<string, Stripe.Event>
	answers: Map<string, KeptAnswer>
}

/** Everything the fake remembers. Maps keep the order of creation, which lists answer backwards. */
export type Store = Tables & { deliveries: Delivery[] }

/** The store as plain JSON, for the state file and for tests that look inside. */
export type StoreDump = {
	[Name in keyof Tables]: [string, Tables[Name] extends Map<string, infer Row> ? Row : never][]
}

function emptyTables(): Tables {
	return {
		customers: new Map(),
		sessions: new Map(),
		sessionSecrets: new Map(),
		intents: new Map(),
		setupIntents: new Map(),
		methods: new Map(),
		behaviours: new Map(),
		waitingCards: new Map(),
		charges: new Map(),
		refunds: new Map(),
		disputes: new Map(),
		balanceTransactions: new Map(),
		payouts: new Map(),
		payoutParts: new Map(),
		readers: new Map(),
		events: new Map(),
		answers: new Map(),
	}
}

/** A new store: nothing but the two readers of the demo. */
export function createStore(): Store {
	const store: Store = { ...emptyTables(), deliveries: [] }
	seedReaders(store.readers)
	return store
}

/** Empties the store and seeds it anew, keeping the same maps. */
export function resetStore(store: Store): void {
	for (const name of tableNames) store[name].clear()
	store.deliveries.length = 0
	seedReaders(store.readers)
}

const tableNames = Object.keys(emptyTables()) as (keyof Tables)[]

/** The tables as JSON can hold them; deliveries are a log and are left out. */
export function dumpStore(store: Store): StoreDump {
	return Object.fromEntries(tableNames.map((name) => [name, [...store[name]]])) as unknown as StoreDump
}

/** Puts a dump back into `store`; a table that the dump lacks stays as it is. */
export function loadStore(store: Store, dump: Partial<StoreDump>): void {
	for (const name of tableNames) {
		const rows = dump[name]
		if (!rows) continue
		const table = store[name] as Map<string, unknown>
		table.clear()
		for (const [id, row] of rows) table.set(id, row)
	}
}
