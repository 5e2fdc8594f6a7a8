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
	uniqueIndex,
	uuid,
} from "drizzle-orm/pg-core"
import { cents, day, grams, id, instant, producerId } from "./columns"
import { lots } from "./lots"
import { users } from "./people"
import { products } from "./pricing"
import { producers } from "./producers"
import { standingOrders } from "./standing-orders"
import { stores } from "./stores"

export const orders = pgTable(
	"orders",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		number: integer("number").notNull(),
		storeId: uuid("store_id").notNull(),
		deliveryOn: day("delivery_on").notNull(),
		state: text("state", { enum: ["placed", "confirmed", "packed", "sent", "received", "cancelled"] })
			.notNull()
			.default("placed"),
		poNumber: text("po_number").notNull().default(""),
		note: text("note").notNull().default(""),
		/** What was charged for the way, fixed when the order was placed. */
		deliveryCents: cents("delivery_cents").notNull().default(0),
		placedBy: uuid("placed_by").references(() => users.id),
		placedAt: instant("placed_at").notNull().defaultNow(),
		/** Set when the order came from a standing order: at most one order for each of its dates. */
		standingOrderId: uuid("standing_order_id"),
		standingOn: day("standing_on"),
		/** Made with the form: a second send of the same form finds the first order. */
		idempotencyKey: uuid("idempotency_key").notNull().defaultRandom(),
	},
	(t) => [
		primaryKey({ name: "orders_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "orders_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		foreignKey({
			name: "orders_standing_order",
			columns: [t.producerId, t.standingOrderId],
			foreignColumns: [standingOrders.producerId, standingOrders.id],
		}),
		unique("orders_number_once").on(t.producerId, t.number),
		unique("orders_one_per_standing_date").on(t.producerId, t.standingOrderId, t.standingOn),
		unique("orders_sent_once").on(t.producerId, t.storeId, t.idempotencyKey),
		index("orders_by_store").on(t.producerId, t.storeId, t.deliveryOn, t.id),
		index("orders_by_day").on(t.producerId, t.deliveryOn, t.id),
		index("orders_open").on(t.producerId, t.deliveryOn, t.id).where(sql`state in ('placed','confirmed')`),
		check("orders_state_known", sql`${t.state} in ('placed','confirmed','packed','sent','received','cancelled')`),
		check("orders_standing_date_whole", sql`(${t.standingOrderId} is null) = (${t.standingOn} is null)`),
		check("orders_money_not_negative", sql`${t.deliveryCents} >= 0`),
	],
)

export const orderLines = pgTable(
	"order_lines",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		orderId: uuid("order_id").notNull(),
		productId: uuid("product_id").notNull(),
		askedCases: smallint("asked_cases").notNull(),
		/** Asked beyond what was free: only `promised_cases` are promised until it is shared out or confirmed. */
		isToShare: boolean("is_to_share").notNull().default(false),
		/** Of a line to be shared out: the cases that are sure already, while the rest waits on the list. */
		promisedCases: smallint("promised_cases").notNull().default(0),
		/** Fewer than this are of no use to the store. */
		leastCases: smallint("least_cases").notNull().default(0),
		/** Products that may stand in for it, the most welcome first. */
		substituteIds: uuid("substitute_ids").array().notNull().default([]),
		/** Null until the producer has decided. */
		givenCases: smallint("given_cases"),
		/** Copied when placed: later price changes alter no placed order. */
		caseCents: cents("case_cents").notNull(),
		/** Set for comb priced by weight: `case_cents` is then an estimate until it is weighed. */
		poundCents: cents("pound_cents"),
		weighedGrams: grams("weighed_grams"),
		piecesPerCase: smallint("pieces_per_case").notNull(),
	},
	(t) => [
		primaryKey({ name: "order_lines_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "order_lines_order",
			columns: [t.producerId, t.orderId],
			foreignColumns: [orders.producerId, orders.id],
		}),
		foreignKey({
			name: "order_lines_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("order_lines_product_once").on(t.producerId, t.orderId, t.productId),
		index("order_lines_by_product").on(t.producerId, t.productId, t.orderId),
		check("order_lines_asked_positive", sql`${t.askedCases} > 0`),
		check("order_lines_given_within_asked", sql`${t.givenCases} between 0 and ${t.askedCases}`),
		check(
			"order_lines_money_not_negative",
			sql`${t.caseCents} >= 0 and ${t.piecesPerCase} > 0 and coalesce(${t.poundCents}, 0) >= 0`,
		),
		check(
			"order_lines_parts_within_asked",
			sql`${t.promisedCases} between 0 and ${t.askedCases} and ${t.leastCases} between 0 and ${t.askedCases}`,
		),
		check(
			"order_lines_weighed_by_weight",
			sql`${t.weighedGrams} is null or (${t.poundCents} is not null and ${t.weighedGrams} >= 0)`,
		),
	],
)

/** Which pieces of which lot fill a line: written when the order is packed, read by every trace. */
export const orderLineLots = pgTable(
	"order_line_lots",
	{
		producerId: producerId().references(() => producers.id),
		orderLineId: uuid("order_line_id").notNull(),
		lotId: uuid("lot_id").notNull(),
		pieces: integer("pieces").notNull(),
	},
	(t) => [
		primaryKey({ name: "order_line_lots_pk", columns: [t.producerId, t.orderLineId, t.lotId] }),
		foreignKey({
			name: "order_line_lots_line",
			columns: [t.producerId, t.orderLineId],
			foreignColumns: [orderLines.producerId, orderLines.id],
		}),
		foreignKey({
			name: "order_line_lots_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("order_line_lots_by_lot").on(t.producerId, t.lotId),
		check("order_line_lots_positive", sql`${t.pieces} > 0`),
	],
)

/** The timeline of an order: who did what, when. */
export const orderEvents = pgTable(
	"order_events",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		orderId: uuid("order_id").notNull(),
		kind: text("kind", {
			enum: [
				"placed",
				"changed",
				"shared",
				"proposed",
				"answered",
				"confirmed",
				"packed",
				"sent",
				"received",
				"cancelled",
				"invoiced",
				"paid",
			],
		}).notNull(),
		at: instant("at").notNull().defaultNow(),
		userId: uuid("user_id").references(() => users.id),
		detail: jsonb("detail").$type<Record<string, unknown>>().notNull().default({}),
	},
	(t) => [
		primaryKey({ name: "order_events_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "order_events_order",
			columns: [t.producerId, t.orderId],
			foreignColumns: [orders.producerId, orders.id],
		}),
		index("order_events_by_order").on(t.producerId, t.orderId, t.at),
	],
)

/** A half-filled sheet, kept for the store as it was typed, on whatever device. */
export const orderDrafts = pgTable(
	"order_drafts",
	{
		producerId: producerId().references(() => producers.id),
		storeId: uuid("store_id").notNull(),
		deliveryOn: day("delivery_on").notNull(),
		/** Field by field as typed. */
		fields: jsonb("fields").$type<Record<string, string>>().notNull(),
		updatedBy: uuid("updated_by")
			.notNull()
			.references(() => users.id),
		updatedAt: instant("updated_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "order_drafts_pk", columns: [t.producerId, t.storeId, t.deliveryOn] }),
		foreignKey({
			name: "order_drafts_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
	],
)

/** What the two sides write to one another about an order. */
export const orderMessages = pgTable(
	"order_messages",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		orderId: uuid("order_id").notNull(),
		side: text("side", { enum: ["store", "desk"] }).notNull(),
		body: text("body").notNull(),
		writtenBy: uuid("written_by")
			.notNull()
			.references(() => users.id),
		writtenAt: instant("written_at").notNull().defaultNow(),
		/** Made with the form: a second send of the same form is the same message. */
		idempotencyKey: uuid("idempotency_key").notNull().defaultRandom(),
	},
	(t) => [
		primaryKey({ name: "order_messages_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "order_messages_order",
			columns: [t.producerId, t.orderId],
			foreignColumns: [orders.producerId, orders.id],
		}),
		unique("order_messages_sent_once").on(t.producerId, t.idempotencyKey),
		index("order_messages_by_order").on(t.producerId, t.orderId, t.writtenAt, t.id),
		check("order_messages_say_something", sql`length(trim(${t.body})) between 1 and 2000`),
	],
)

/** A late change by the producer that costs the store more or gives it less: it stands when the store accepts it. */
export const orderProposals = pgTable(
	"order_proposals",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		orderId: uuid("order_id").notNull(),
		lines: jsonb("lines")
			.$type<{ lineId: string; fromCases: number; toCases: number; fromCents: number; toCents: number }[]>()
			.notNull(),
		reason: text("reason").notNull(),
		state: text("state", { enum: ["open", "accepted", "declined", "taken-back"] })
			.notNull()
			.default("open"),
		proposedBy: uuid("proposed_by")
			.notNull()
			.references(() => users.id),
		proposedAt: instant("proposed_at").notNull().defaultNow(),
		answeredBy: uuid("answered_by").references(() => users.id),
		answeredAt: instant("answered_at"),
	},
	(t) => [
		primaryKey({ name: "order_proposals_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "order_proposals_order",
			columns: [t.producerId, t.orderId],
			foreignColumns: [orders.producerId, orders.id],
		}),
		index("order_proposals_by_order").on(t.producerId, t.orderId, t.proposedAt),
		uniqueIndex("order_proposals_one_open").on(t.producerId, t.orderId).where(sql`state = 'open'`),
		check("order_proposals_state_known", sql`${t.state} in ('open','accepted','declined','taken-back')`),
		check("order_proposals_answer_whole", sql`(${t.state} = 'open') = (${t.answeredAt} is null)`),
	],
)
