import { sql } from "drizzle-orm"
import {
	boolean,
	check,
	foreignKey,
	index,
	integer,
	pgTable,
	primaryKey,
	smallint,
	text,
	unique,
	uuid,
} from "drizzle-orm/pg-core"
import { cents, day, grams, id, instant, producerId } from "./columns"
import { orders } from "./orders"
import { users } from "./people"
import { products } from "./pricing"
import { producers } from "./producers"
import { stores } from "./stores"

/** Issued on dispatch from what was packed; never altered afterwards but for what has been paid. */
export const invoices = pgTable(
	"invoices",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		year: smallint("year").notNull(),
		/** Gapless within a producer and year. */
		sequence: integer("sequence").notNull(),
		storeId: uuid("store_id").notNull(),
		orderId: uuid("order_id").notNull(),
		issuedOn: day("issued_on").notNull(),
		dueOn: day("due_on").notNull(),
		linesCents: cents("lines_cents").notNull(),
		deliveryCents: cents("delivery_cents").notNull(),
		taxCents: cents("tax_cents").notNull(),
		totalCents: cents("total_cents").notNull(),
		paidCents: cents("paid_cents").notNull().default(0),
		shortNote: text("short_note").notNull().default(""),
		/** As they stood when it was issued: a store's terms and certificate may change afterwards. */
		termsWords: text("terms_words").notNull().default(""),
		isForResale: boolean("is_for_resale").notNull().default(false),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "invoices_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "invoices_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		foreignKey({
			name: "invoices_order",
			columns: [t.producerId, t.orderId],
			foreignColumns: [orders.producerId, orders.id],
		}),
		unique("invoices_number_once").on(t.producerId, t.year, t.sequence),
		unique("invoices_once_per_order").on(t.producerId, t.orderId),
		index("invoices_by_store").on(t.producerId, t.storeId, t.issuedOn, t.id),
		index("invoices_by_day").on(t.producerId, t.issuedOn, t.id),
		index("invoices_open").on(t.producerId, t.dueOn, t.id).where(sql`paid_cents < total_cents`),
		check("invoices_sum", sql`${t.totalCents} = ${t.linesCents} + ${t.deliveryCents} + ${t.taxCents}`),
		check(
			"invoices_money_not_negative",
			sql`${t.linesCents} >= 0 and ${t.deliveryCents} >= 0 and ${t.taxCents} >= 0 and ${t.paidCents} >= 0`,
		),
		check("invoices_paid_within_total", sql`${t.paidCents} <= ${t.totalCents}`),
		check("invoices_dates_in_order", sql`${t.dueOn} >= ${t.issuedOn}`),
	],
)

export const invoiceLines = pgTable(
	"invoice_lines",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		invoiceId: uuid("invoice_id").notNull(),
		/** Order on the page. */
		position: smallint("position").notNull(),
		productId: uuid("product_id").notNull(),
		code: text("code").notNull(),
		name: text("name").notNull(),
		detail: text("detail").notNull(),
		lotCodes: text("lot_codes").notNull().default(""),
		netGrams: grams("net_grams").notNull(),
		askedCases: smallint("asked_cases").notNull(),
		sentCases: smallint("sent_cases").notNull(),
		caseCents: cents("case_cents").notNull(),
		lineCents: cents("line_cents").notNull(),
		taxCents: cents("tax_cents").notNull().default(0),
	},
	(t) => [
		primaryKey({ name: "invoice_lines_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "invoice_lines_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		foreignKey({
			name: "invoice_lines_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("invoice_lines_position_once").on(t.producerId, t.invoiceId, t.position),
		check(
			"invoice_lines_sane",
			sql`${t.sentCases} between 0 and ${t.askedCases} and ${t.lineCents} >= 0 and ${t.netGrams} >= 0`,
		),
	],
)

/** Money that came in from a store; what it settles is in `payment_parts`. */
export const payments = pgTable(
	"payments",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		method: text("method", { enum: ["card", "cheque", "cash", "transfer"] }).notNull(),
		amountCents: cents("amount_cents").notNull(),
		receivedAt: instant("received_at").notNull().defaultNow(),
		/** Names the card payment at Stripe: the same payment is never written twice. */
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
		index("payments_by_store").on(t.producerId, t.storeId, t.receivedAt, t.id),
		check("payments_amount_positive", sql`${t.amountCents} > 0`),
		check("payments_card_names_its_payment", sql`(${t.method} = 'card') = (${t.stripePaymentIntentId} is not null)`),
	],
)

export const paymentParts = pgTable(
	"payment_parts",
	{
		producerId: producerId().references(() => producers.id),
		paymentId: uuid("payment_id").notNull(),
		invoiceId: uuid("invoice_id").notNull(),
		amountCents: cents("amount_cents").notNull(),
	},
	(t) => [
		primaryKey({ name: "payment_parts_pk", columns: [t.producerId, t.paymentId, t.invoiceId] }),
		foreignKey({
			name: "payment_parts_payment",
			columns: [t.producerId, t.paymentId],
			foreignColumns: [payments.producerId, payments.id],
		}),
		foreignKey({
			name: "payment_parts_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		index("payment_parts_by_invoice").on(t.producerId, t.invoiceId),
		check("payment_parts_positive", sql`${t.amountCents} > 0`),
	],
)
