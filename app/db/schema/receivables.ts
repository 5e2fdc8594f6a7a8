import { sql } from "drizzle-orm"
import {
	boolean,
	check,
	foreignKey,
	index,
	pgTable,
	primaryKey,
	smallint,
	text,
	unique,
	uuid,
} from "drizzle-orm/pg-core"
import { cents, day, id, instant, producerId } from "./columns"
import { invoices } from "./invoicing"
import { users } from "./people"
import { producers } from "./producers"
import { stores } from "./stores"

/** When a store is reminded of an invoice, and in which words; days below 0 are before it falls due. */
export const reminderSteps = pgTable(
	"reminder_steps",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		daysAfterDue: smallint("days_after_due").notNull(),
		subject: text("subject").notNull(),
		body: text("body").notNull(),
		isActive: boolean("is_active").notNull().default(true),
	},
	(t) => [
		primaryKey({ name: "reminder_steps_pk", columns: [t.producerId, t.id] }),
		unique("reminder_steps_day_once").on(t.producerId, t.daysAfterDue),
		check("reminder_steps_sane", sql`${t.daysAfterDue} between -30 and 365`),
		check(
			"reminder_steps_say_something",
			sql`length(trim(${t.subject})) between 1 and 200 and length(trim(${t.body})) between 1 and 2000`,
		),
	],
)

/** Of which invoice a step was sent; once each, however often the job runs. */
export const remindersSent = pgTable(
	"reminders_sent",
	{
		producerId: producerId().references(() => producers.id),
		invoiceId: uuid("invoice_id").notNull(),
		stepId: uuid("step_id").notNull(),
		sentAt: instant("sent_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "reminders_sent_pk", columns: [t.producerId, t.invoiceId, t.stepId] }),
		foreignKey({
			name: "reminders_sent_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		foreignKey({
			name: "reminders_sent_step",
			columns: [t.producerId, t.stepId],
			foreignColumns: [reminderSteps.producerId, reminderSteps.id],
		}),
	],
)

/** What a store has said it will pay, and when. */
export const paymentPromises = pgTable(
	"payment_promises",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		amountCents: cents("amount_cents").notNull(),
		promisedOn: day("promised_on").notNull(),
		note: text("note").notNull().default(""),
		/** Kept or broken as a person judged it. */
		state: text("state", { enum: ["open", "kept", "broken"] })
			.notNull()
			.default("open"),
		notedBy: uuid("noted_by")
			.notNull()
			.references(() => users.id),
		notedAt: instant("noted_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "payment_promises_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "payment_promises_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		index("payment_promises_by_store").on(t.producerId, t.storeId, t.promisedOn, t.id),
		index("payment_promises_open").on(t.producerId, t.promisedOn, t.id).where(sql`state = 'open'`),
		check("payment_promises_amount_positive", sql`${t.amountCents} > 0`),
		check("payment_promises_state_known", sql`${t.state} in ('open','kept','broken')`),
	],
)
