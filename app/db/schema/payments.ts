import { sql } from "drizzle-orm"
import {
	boolean,
	check,
	foreignKey,
	index,
	integer,
	jsonb,
	pgTable,
	primaryKey,
	smallint,
	text,
	unique,
	uuid,
} from "drizzle-orm/pg-core"
import { cents, day, id, instant, producerId } from "./columns"
import { invoiceLines, invoices } from "./invoicing"
import { users } from "./people"
import { producers } from "./producers"
import { stores } from "./stores"

/** Money that came in from a store, in whatever way; what it settles stands in `settlements`. */
export const payments = pgTable(
	"payments",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		method: text("method", { enum: ["card", "bank-debit", "cheque", "cash", "transfer"] }).notNull(),
		/** A bank debit settles nothing until it has cleared; one that the bank returned never does. */
		state: text("state", { enum: ["on-its-way", "settled", "returned"] })
			.notNull()
			.default("settled"),
		amountCents: cents("amount_cents").notNull(),
		/** The day it counts in the books. */
		receivedOn: day("received_on").notNull(),
		receivedAt: instant("received_at").notNull().defaultNow(),
		/** What is settled with it and what of it went back; the rest is on the store's account. Kept by the database. */
		settledCents: cents("settled_cents").notNull().default(0),
		returnedCents: cents("returned_cents").notNull().default(0),
		/** The number of a check, the words of a transfer. */
		reference: text("reference").notNull().default(""),
		/** What Stripe kept, and the payout that brought the rest; null until known. */
		feeCents: cents("fee_cents"),
		stripePayoutId: text("stripe_payout_id"),
		/** Names the payment at Stripe: the same payment is never written twice. */
		stripePaymentIntentId: text("stripe_payment_intent_id"),
		enteredBy: uuid("entered_by").references(() => users.id),
	},
	(t) => [
		primaryKey({ name: "payments_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "payments_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		unique("payments_card_payment_once").on(t.producerId, t.stripePaymentIntentId),
		index("payments_by_store").on(t.producerId, t.storeId, t.receivedOn, t.id),
		index("payments_by_day").on(t.producerId, t.receivedOn, t.id),
		index("payments_on_account")
			.on(t.producerId, t.storeId)
			.where(sql`state = 'settled' and settled_cents + returned_cents < amount_cents`),
		check("payments_amount_positive", sql`${t.amountCents} > 0`),
		check("payments_method_known", sql`${t.method} in ('card','bank-debit','cheque','cash','transfer')`),
		check("payments_state_known", sql`${t.state} in ('on-its-way','settled','returned')`),
		check(
			"payments_by_stripe_named",
			sql`(${t.method} in ('card','bank-debit')) = (${t.stripePaymentIntentId} is not null)`,
		),
		check(
			"payments_within_amount",
			sql`${t.settledCents} >= 0 and ${t.returnedCents} >= 0 and ${t.settledCents} + ${t.returnedCents} <= ${t.amountCents}`,
		),
		check("payments_settle_when_cleared", sql`${t.state} = 'settled' or ${t.settledCents} = 0`),
	],
)

/** What of a payment went back: refunded, returned by the bank, taken by a dispute, or a check that bounced. */
export const paymentReturns = pgTable(
	"payment_returns",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		paymentId: uuid("payment_id").notNull(),
		kind: text("kind", { enum: ["refund", "bank-return", "dispute", "bounced"] }).notNull(),
		/** Only what is done counts: a refund may still fail, a dispute may be won. */
		state: text("state", { enum: ["asked", "done", "failed", "won"] }).notNull(),
		amountCents: cents("amount_cents").notNull(),
		returnedOn: day("returned_on").notNull(),
		/** The refund's or dispute's name at Stripe. */
		stripeId: text("stripe_id"),
		note: text("note").notNull().default(""),
		enteredBy: uuid("entered_by").references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "payment_returns_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "payment_returns_payment",
			columns: [t.producerId, t.paymentId],
			foreignColumns: [payments.producerId, payments.id],
		}),
		unique("payment_returns_stripe_once").on(t.producerId, t.stripeId),
		index("payment_returns_by_payment").on(t.producerId, t.paymentId),
		index("payment_returns_by_day").on(t.producerId, t.returnedOn, t.id),
		check("payment_returns_amount_positive", sql`${t.amountCents} > 0`),
		check("payment_returns_kind_known", sql`${t.kind} in ('refund','bank-return','dispute','bounced')`),
		check("payment_returns_state_known", sql`${t.state} in ('asked','done','failed','won')`),
	],
)

/** A credit memo: takes off what was invoiced. Never altered; what is over stays on the store's account. */
export const credits = pgTable(
	"credits",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		year: smallint("year").notNull(),
		/** Gapless within a producer and year, as invoices are. */
		sequence: integer("sequence").notNull(),
		storeId: uuid("store_id").notNull(),
		/** The invoice that it mends; null for one out of goodwill. */
		invoiceId: uuid("invoice_id"),
		issuedOn: day("issued_on").notNull(),
		kind: text("kind", { enum: ["breakage", "price", "quantity", "goodwill"] }).notNull(),
		reason: text("reason").notNull(),
		linesCents: cents("lines_cents").notNull(),
		taxCents: cents("tax_cents").notNull(),
		totalCents: cents("total_cents").notNull(),
		/** What is settled with it; kept by the database from `settlements`. */
		settledCents: cents("settled_cents").notNull().default(0),
		issuedBy: uuid("issued_by")
			.notNull()
			.references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "credits_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "credits_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		foreignKey({
			name: "credits_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		unique("credits_number_once").on(t.producerId, t.year, t.sequence),
		index("credits_by_store").on(t.producerId, t.storeId, t.issuedOn, t.id),
		index("credits_by_day").on(t.producerId, t.issuedOn, t.id),
		index("credits_by_invoice").on(t.producerId, t.invoiceId),
		index("credits_on_account").on(t.producerId, t.storeId).where(sql`settled_cents < total_cents`),
		check("credits_sum", sql`${t.totalCents} = ${t.linesCents} + ${t.taxCents} and ${t.totalCents} > 0`),
		check("credits_money_not_negative", sql`${t.linesCents} >= 0 and ${t.taxCents} >= 0`),
		check("credits_within_total", sql`${t.settledCents} between 0 and ${t.totalCents}`),
		check("credits_kind_known", sql`${t.kind} in ('breakage','price','quantity','goodwill')`),
	],
)

export const creditLines = pgTable(
	"credit_lines",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		creditId: uuid("credit_id").notNull(),
		position: smallint("position").notNull(),
		invoiceLineId: uuid("invoice_line_id"),
		code: text("code").notNull().default(""),
		name: text("name").notNull(),
		detail: text("detail").notNull().default(""),
		/** Pieces that the line is about; 0 where it is about money alone. */
		pieces: integer("pieces").notNull().default(0),
		lineCents: cents("line_cents").notNull(),
		taxCents: cents("tax_cents").notNull().default(0),
	},
	(t) => [
		primaryKey({ name: "credit_lines_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "credit_lines_credit",
			columns: [t.producerId, t.creditId],
			foreignColumns: [credits.producerId, credits.id],
		}),
		foreignKey({
			name: "credit_lines_invoice_line",
			columns: [t.producerId, t.invoiceLineId],
			foreignColumns: [invoiceLines.producerId, invoiceLines.id],
		}),
		unique("credit_lines_position_once").on(t.producerId, t.creditId, t.position),
		index("credit_lines_by_invoice_line").on(t.producerId, t.invoiceLineId),
		check("credit_lines_sane", sql`${t.pieces} >= 0 and ${t.lineCents} >= 0 and ${t.taxCents} >= 0`),
	],
)

/**
 * What settles an invoice, append-only: part of a payment, part of a credit, the discount taken with a payment, or what is
 * given up as lost. A row below zero takes back an earlier one, as when a bank returns a debit. The database keeps the sums
 * on invoice, payment and credit from it.
 */
export const settlements = pgTable(
	"settlements",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		invoiceId: uuid("invoice_id").notNull(),
		kind: text("kind", { enum: ["payment", "credit", "discount", "write-off"] }).notNull(),
		paymentId: uuid("payment_id"),
		creditId: uuid("credit_id"),
		amountCents: cents("amount_cents").notNull(),
		settledOn: day("settled_on").notNull(),
		settledAt: instant("settled_at").notNull().defaultNow(),
		enteredBy: uuid("entered_by").references(() => users.id),
	},
	(t) => [
		primaryKey({ name: "settlements_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "settlements_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		foreignKey({
			name: "settlements_payment",
			columns: [t.producerId, t.paymentId],
			foreignColumns: [payments.producerId, payments.id],
		}),
		foreignKey({
			name: "settlements_credit",
			columns: [t.producerId, t.creditId],
			foreignColumns: [credits.producerId, credits.id],
		}),
		index("settlements_by_invoice").on(t.producerId, t.invoiceId, t.settledAt),
		index("settlements_by_payment").on(t.producerId, t.paymentId),
		index("settlements_by_credit").on(t.producerId, t.creditId),
		index("settlements_by_day").on(t.producerId, t.settledOn, t.id),
		check("settlements_not_nothing", sql`${t.amountCents} <> 0`),
		check(
			"settlements_source_whole",
			sql`(${t.kind} in ('payment','discount')) = (${t.paymentId} is not null) and (${t.kind} = 'credit') = (${t.creditId} is not null)`,
		),
		check("settlements_kind_known", sql`${t.kind} in ('payment','credit','discount','write-off')`),
	],
)

/**
 * One try to take money through Stripe: a visit to the hosted page, a debit when something falls due, or a visit that only
 * keeps a way to pay. Its id is the idempotency key and comes back in every event.
 */
export const onlinePayments = pgTable(
	"online_payments",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		kind: text("kind", { enum: ["visit", "automatic", "keep-method"] })
			.notNull()
			.default("visit"),
		method: text("method", { enum: ["card", "bank-debit"] })
			.notNull()
			.default("card"),
		amountCents: cents("amount_cents").notNull(),
		state: text("state", { enum: ["open", "on-its-way", "paid", "declined", "expired"] })
			.notNull()
			.default("open"),
		stripeSessionId: text("stripe_session_id"),
		stripePaymentIntentId: text("stripe_payment_intent_id"),
		declineMessage: text("decline_message").notNull().default(""),
		/** The day of an automatic payment: one a day and store. */
		dueOn: day("due_on"),
		startedBy: uuid("started_by").references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "online_payments_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "online_payments_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		unique("online_payments_automatic_once").on(t.producerId, t.storeId, t.dueOn),
		index("online_payments_by_store").on(t.producerId, t.storeId, t.createdAt),
		check(
			"online_payments_amount_sane",
			sql`(${t.kind} = 'keep-method') = (${t.amountCents} = 0) and ${t.amountCents} >= 0`,
		),
		check("online_payments_kind_known", sql`${t.kind} in ('visit','automatic','keep-method')`),
		check("online_payments_method_known", sql`${t.method} in ('card','bank-debit')`),
		check("online_payments_state_known", sql`${t.state} in ('open','on-its-way','paid','declined','expired')`),
		check(
			"online_payments_started_whole",
			sql`(${t.kind} = 'automatic') = (${t.startedBy} is null) and (${t.kind} = 'automatic') = (${t.dueOn} is not null)`,
		),
	],
)

/** The invoices that a try is meant for, and how much of each. */
export const onlinePaymentParts = pgTable(
	"online_payment_parts",
	{
		producerId: producerId().references(() => producers.id),
		onlinePaymentId: uuid("online_payment_id").notNull(),
		invoiceId: uuid("invoice_id").notNull(),
		amountCents: cents("amount_cents").notNull(),
		/** The discount that goes with it when it is paid in time. */
		discountCents: cents("discount_cents").notNull().default(0),
	},
	(t) => [
		primaryKey({ name: "online_payment_parts_pk", columns: [t.producerId, t.onlinePaymentId, t.invoiceId] }),
		foreignKey({
			name: "online_payment_parts_payment",
			columns: [t.producerId, t.onlinePaymentId],
			foreignColumns: [onlinePayments.producerId, onlinePayments.id],
		}),
		foreignKey({
			name: "online_payment_parts_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		index("online_payment_parts_by_invoice").on(t.producerId, t.invoiceId),
		check("online_payment_parts_sane", sql`${t.amountCents} > 0 and ${t.discountCents} >= 0`),
	],
)

/** This producer's part of what Stripe paid out to the bank. */
export const payouts = pgTable(
	"payouts",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		stripePayoutId: text("stripe_payout_id").notNull(),
		arrivedOn: day("arrived_on").notNull(),
		grossCents: cents("gross_cents").notNull(),
		feeCents: cents("fee_cents").notNull(),
		netCents: cents("net_cents").notNull(),
	},
	(t) => [
		primaryKey({ name: "payouts_pk", columns: [t.producerId, t.id] }),
		unique("payouts_once").on(t.producerId, t.stripePayoutId),
		index("payouts_by_day").on(t.producerId, t.arrivedOn, t.id),
		check("payouts_sum", sql`${t.netCents} = ${t.grossCents} - ${t.feeCents}`),
	],
)

/** Where the nightly look at Stripe found something other than what stands here. */
export const stripeDifferences = pgTable(
	"stripe_differences",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		/** In words of its own: "paid there, open here". */
		kind: text("kind", { enum: ["missing-here", "missing-there", "other-amount", "other-state"] }).notNull(),
		stripeId: text("stripe_id").notNull(),
		ourCents: cents("our_cents"),
		theirCents: cents("their_cents"),
		detail: text("detail").notNull().default(""),
		foundAt: instant("found_at").notNull().defaultNow(),
		/** Set when a later look found the two alike, or a person has put it right. */
		settledAt: instant("settled_at"),
	},
	(t) => [
		primaryKey({ name: "stripe_differences_pk", columns: [t.producerId, t.id] }),
		unique("stripe_differences_once").on(t.producerId, t.kind, t.stripeId),
		index("stripe_differences_open").on(t.producerId, t.foundAt).where(sql`settled_at is null`),
		check(
			"stripe_differences_kind_known",
			sql`${t.kind} in ('missing-here','missing-there','other-amount','other-state')`,
		),
	],
)

/** Events as they came, before anyone knows whose they are; applied once by a job. */
export const stripeEvents = pgTable(
	"stripe_events",
	{
		id: text("id").primaryKey(),
		type: text("type").notNull(),
		isLive: boolean("is_live").notNull(),
		payload: jsonb("payload").$type<Record<string, unknown>>().notNull(),
		receivedAt: instant("received_at").notNull().defaultNow(),
		appliedAt: instant("applied_at"),
		deliveries: integer("deliveries").notNull().default(1),
	},
	(t) => [index("stripe_events_waiting").on(t.receivedAt).where(sql`applied_at is null`)],
)

/** Mail to be sent, written in the transaction that it tells of. */
export const outboxMails = pgTable(
	"outbox_mails",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		recipient: text("recipient").notNull(),
		template: text("template").notNull(),
		props: jsonb("props").$type<Record<string, unknown>>().notNull(),
		/** One event gives one mail to one person, however often its job runs. */
		onceKey: text("once_key").notNull(),
		createdAt: instant("created_at").notNull().defaultNow(),
		sentAt: instant("sent_at"),
		attempts: integer("attempts").notNull().default(0),
		lastError: text("last_error").notNull().default(""),
	},
	(t) => [
		primaryKey({ name: "outbox_mails_pk", columns: [t.producerId, t.id] }),
		unique("outbox_mails_once").on(t.producerId, t.onceKey, t.recipient),
		index("outbox_mails_waiting").on(t.producerId, t.createdAt).where(sql`sent_at is null`),
	],
)
