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
import { bytes, cents, day, grams, id, instant, producerId } from "./columns"
import { orderLines, orders } from "./orders"
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
		/** Goods that were sent, or a charge for paying late. */
		kind: text("kind", { enum: ["goods", "finance-charge"] })
			.notNull()
			.default("goods"),
		/** Of an invoice that a job makes: "month-end 2026-08 …"; a second run finds it there. */
		onceKey: text("once_key"),
		issuedOn: day("issued_on").notNull(),
		dueOn: day("due_on").notNull(),
		linesCents: cents("lines_cents").notNull(),
		deliveryCents: cents("delivery_cents").notNull(),
		taxCents: cents("tax_cents").notNull(),
		totalCents: cents("total_cents").notNull(),
		/** The four ways to settle it; kept by the database from `settlements`. */
		paidCents: cents("paid_cents").notNull().default(0),
		creditedCents: cents("credited_cents").notNull().default(0),
		discountCents: cents("discount_cents").notNull().default(0),
		writtenOffCents: cents("written_off_cents").notNull().default(0),
		openCents: cents("open_cents")
			.notNull()
			.generatedAlwaysAs(sql`total_cents - paid_cents - credited_cents - discount_cents - written_off_cents`),
		/** The last day on which `discountBasisPoints` may be taken off; null without a discount. */
		discountUntil: day("discount_until"),
		discountBasisPoints: integer("discount_basis_points").notNull().default(0),
		taxBasisPoints: integer("tax_basis_points").notNull().default(0),
		taxPlace: text("tax_place").notNull().default(""),
		/** The store's own numbers of the orders on it. */
		poNumbers: text("po_numbers").notNull().default(""),
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
		unique("invoices_number_once").on(t.producerId, t.year, t.sequence),
		index("invoices_by_store").on(t.producerId, t.storeId, t.issuedOn, t.id),
		index("invoices_by_day").on(t.producerId, t.issuedOn, t.id),
		unique("invoices_made_once").on(t.producerId, t.onceKey),
		index("invoices_owed").on(t.producerId, t.dueOn, t.id).where(sql`open_cents > 0`),
		index("invoices_owed_by_store").on(t.producerId, t.storeId, t.dueOn, t.id).where(sql`open_cents > 0`),
		check("invoices_sum", sql`${t.totalCents} = ${t.linesCents} + ${t.deliveryCents} + ${t.taxCents}`),
		check(
			"invoices_money_not_negative",
			sql`${t.linesCents} >= 0 and ${t.deliveryCents} >= 0 and ${t.taxCents} >= 0 and ${t.paidCents} >= 0 and ${t.creditedCents} >= 0 and ${t.discountCents} >= 0 and ${t.writtenOffCents} >= 0`,
		),
		check(
			"invoices_settled_within_total",
			sql`${t.paidCents} + ${t.creditedCents} + ${t.discountCents} + ${t.writtenOffCents} <= ${t.totalCents}`,
		),
		check("invoices_kind_known", sql`${t.kind} in ('goods','finance-charge')`),
		check("invoices_discount_whole", sql`(${t.discountUntil} is null) = (${t.discountBasisPoints} = 0)`),
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
		/** The order that the line fills; null on a charge. */
		orderId: uuid("order_id"),
		orderLineId: uuid("order_line_id"),
		/** Null on a charge that is no product. */
		productId: uuid("product_id"),
		code: text("code").notNull(),
		name: text("name").notNull(),
		detail: text("detail").notNull(),
		lotCodes: text("lot_codes").notNull().default(""),
		netGrams: grams("net_grams").notNull(),
		askedCases: smallint("asked_cases").notNull(),
		sentCases: smallint("sent_cases").notNull(),
		caseCents: cents("case_cents").notNull(),
		/** Priced by weight: cents for a pound of `netGrams`, which were weighed; `caseCents` was the estimate. */
		poundCents: cents("pound_cents"),
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
			name: "invoice_lines_order_line",
			columns: [t.producerId, t.orderLineId],
			foreignColumns: [orderLines.producerId, orderLines.id],
		}),
		foreignKey({
			name: "invoice_lines_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("invoice_lines_position_once").on(t.producerId, t.invoiceId, t.position),
		index("invoice_lines_by_product").on(t.producerId, t.productId, t.invoiceId),
		check(
			"invoice_lines_sane",
			sql`${t.sentCases} between 0 and ${t.askedCases} and ${t.lineCents} >= 0 and ${t.netGrams} >= 0`,
		),
	],
)

/** The orders that an invoice is about; an order is invoiced once. */
export const invoiceOrders = pgTable(
	"invoice_orders",
	{
		producerId: producerId().references(() => producers.id),
		orderId: uuid("order_id").notNull(),
		invoiceId: uuid("invoice_id").notNull(),
	},
	(t) => [
		primaryKey({ name: "invoice_orders_pk", columns: [t.producerId, t.orderId] }),
		foreignKey({
			name: "invoice_orders_order",
			columns: [t.producerId, t.orderId],
			foreignColumns: [orders.producerId, orders.id],
		}),
		foreignKey({
			name: "invoice_orders_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		index("invoice_orders_by_invoice").on(t.producerId, t.invoiceId),
	],
)

/** Many orders sent and invoiced in one go, by a job that can be watched. */
export const invoiceRuns = pgTable(
	"invoice_runs",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		startedBy: uuid("started_by")
			.notNull()
			.references(() => users.id),
		startedAt: instant("started_at").notNull().defaultNow(),
		finishedAt: instant("finished_at"),
	},
	(t) => [
		primaryKey({ name: "invoice_runs_pk", columns: [t.producerId, t.id] }),
		index("invoice_runs_by_start").on(t.producerId, t.startedAt, t.id),
	],
)

export const invoiceRunOrders = pgTable(
	"invoice_run_orders",
	{
		producerId: producerId().references(() => producers.id),
		runId: uuid("run_id").notNull(),
		orderId: uuid("order_id").notNull(),
		state: text("state", { enum: ["waiting", "done", "refused"] })
			.notNull()
			.default("waiting"),
		/** Why it was refused, in words. */
		problem: text("problem").notNull().default(""),
	},
	(t) => [
		primaryKey({ name: "invoice_run_orders_pk", columns: [t.producerId, t.runId, t.orderId] }),
		foreignKey({
			name: "invoice_run_orders_run",
			columns: [t.producerId, t.runId],
			foreignColumns: [invoiceRuns.producerId, invoiceRuns.id],
		}),
		foreignKey({
			name: "invoice_run_orders_order",
			columns: [t.producerId, t.orderId],
			foreignColumns: [orders.producerId, orders.id],
		}),
		check("invoice_run_orders_state_known", sql`${t.state} in ('waiting','done','refused')`),
	],
)

/** Sales-tax rates by place and day; a place's rate is the latest that has begun. Local rules decide which applies. */
export const taxRates = pgTable(
	"tax_rates",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		place: text("place").notNull(),
		validFrom: day("valid_from").notNull(),
		basisPoints: integer("basis_points").notNull(),
	},
	(t) => [
		primaryKey({ name: "tax_rates_pk", columns: [t.producerId, t.id] }),
		unique("tax_rates_once").on(t.producerId, t.place, t.validFrom),
		check("tax_rates_sane", sql`${t.basisPoints} between 0 and 3000 and length(trim(${t.place})) > 0`),
	],
)

/** A resale certificate as it was handed in; the producer looks at it and says until when it holds. */
export const exemptionCertificates = pgTable(
	"exemption_certificates",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		number: text("number").notNull(),
		validUntil: day("valid_until").notNull(),
		fileName: text("file_name").notNull(),
		mediaType: text("media_type", { enum: ["application/pdf", "image/jpeg", "image/png", "image/webp"] }).notNull(),
		content: bytes("content").notNull(),
		state: text("state", { enum: ["handed-in", "accepted", "refused"] })
			.notNull()
			.default("handed-in"),
		/** Why it was refused. */
		answer: text("answer").notNull().default(""),
		handedInBy: uuid("handed_in_by")
			.notNull()
			.references(() => users.id),
		handedInAt: instant("handed_in_at").notNull().defaultNow(),
		decidedBy: uuid("decided_by").references(() => users.id),
		decidedAt: instant("decided_at"),
	},
	(t) => [
		primaryKey({ name: "exemption_certificates_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "exemption_certificates_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		index("exemption_certificates_by_store").on(t.producerId, t.storeId, t.handedInAt),
		index("exemption_certificates_waiting").on(t.producerId, t.handedInAt).where(sql`state = 'handed-in'`),
		check("exemption_certificates_state_known", sql`${t.state} in ('handed-in','accepted','refused')`),
		check("exemption_certificates_decided_whole", sql`(${t.state} = 'handed-in') = (${t.decidedAt} is null)`),
		check("exemption_certificates_size_sane", sql`length(${t.content}) between 1 and 10485760`),
	],
)
