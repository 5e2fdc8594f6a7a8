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
	text,
	unique,
	uuid,
} from "drizzle-orm/pg-core"
import { cents, id, instant, producerId } from "./columns"
import { invoices } from "./invoicing"
import { users } from "./people"
import { producers } from "./producers"

/** One visit to the hosted card page for an invoice. Its id is the idempotency key and comes back in every event. */
export const cardPayments = pgTable(
	"card_payments",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		invoiceId: uuid("invoice_id").notNull(),
		amountCents: cents("amount_cents").notNull(),
		state: text("state", { enum: ["open", "paid", "declined", "expired"] })
			.notNull()
			.default("open"),
		stripeSessionId: text("stripe_session_id"),
		stripePaymentIntentId: text("stripe_payment_intent_id"),
		declineMessage: text("decline_message").notNull().default(""),
		startedBy: uuid("started_by")
			.notNull()
			.references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "card_payments_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "card_payments_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		index("card_payments_by_invoice").on(t.producerId, t.invoiceId, t.createdAt),
		check("card_payments_amount_positive", sql`${t.amountCents} > 0`),
		check("card_payments_state_known", sql`${t.state} in ('open','paid','declined','expired')`),
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
