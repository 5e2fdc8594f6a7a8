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
import { day, id, instant, producerId } from "./columns"
import { users } from "./people"
import { products } from "./pricing"
import { producers } from "./producers"
import { stores } from "./stores"

/** An order that repeats by an iCalendar rule (RFC 5545) bound to the store's delivery days. */
export const standingOrders = pgTable(
	"standing_orders",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		rule: text("rule").notNull(),
		startsOn: day("starts_on").notNull(),
		/** Last day it may fall on; null = until the crop ends. */
		endsOn: day("ends_on"),
		pausedFrom: day("paused_from"),
		/** The last day of the pause; null = until it is resumed. */
		pausedUntil: day("paused_until"),
		/** Made before the season: served before other standing orders when the crop is short. */
		isCommitment: boolean("is_commitment").notNull().default(false),
		createdBy: uuid("created_by")
			.notNull()
			.references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
		endedAt: instant("ended_at"),
		idempotencyKey: uuid("idempotency_key").notNull().defaultRandom(),
	},
	(t) => [
		primaryKey({ name: "standing_orders_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "standing_orders_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		unique("standing_orders_sent_once").on(t.producerId, t.storeId, t.idempotencyKey),
		index("standing_orders_by_store").on(t.producerId, t.storeId, t.createdAt),
		check("standing_orders_dates_in_order", sql`${t.endsOn} is null or ${t.endsOn} >= ${t.startsOn}`),
		check("standing_orders_pause_in_order", sql`${t.pausedUntil} is null or ${t.pausedUntil} >= ${t.pausedFrom}`),
	],
)

export const standingOrderLines = pgTable(
	"standing_order_lines",
	{
		producerId: producerId().references(() => producers.id),
		standingOrderId: uuid("standing_order_id").notNull(),
		productId: uuid("product_id").notNull(),
		cases: smallint("cases").notNull(),
		/** The least the store would take; less than this is not worth a delivery to it. */
		leastCases: smallint("least_cases").notNull().default(0),
		/** Products that may stand in for it when it is short, the most welcome first. */
		substituteIds: uuid("substitute_ids").array().notNull().default([]),
	},
	(t) => [
		primaryKey({ name: "standing_order_lines_pk", columns: [t.producerId, t.standingOrderId, t.productId] }),
		foreignKey({
			name: "standing_order_lines_order",
			columns: [t.producerId, t.standingOrderId],
			foreignColumns: [standingOrders.producerId, standingOrders.id],
		}),
		foreignKey({
			name: "standing_order_lines_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		check("standing_order_lines_sane", sql`${t.cases} > 0 and ${t.leastCases} between 0 and ${t.cases}`),
	],
)

/** Dates of the rule on which the store wants nothing. */
export const standingOrderSkips = pgTable(
	"standing_order_skips",
	{
		producerId: producerId().references(() => producers.id),
		standingOrderId: uuid("standing_order_id").notNull(),
		skipOn: day("skip_on").notNull(),
	},
	(t) => [
		primaryKey({ name: "standing_order_skips_pk", columns: [t.producerId, t.standingOrderId, t.skipOn] }),
		foreignKey({
			name: "standing_order_skips_order",
			columns: [t.producerId, t.standingOrderId],
			foreignColumns: [standingOrders.producerId, standingOrders.id],
		}),
	],
)

/** Cases of one line for one date only, in place of the usual. */
export const standingOrderChanges = pgTable(
	"standing_order_changes",
	{
		producerId: producerId().references(() => producers.id),
		standingOrderId: uuid("standing_order_id").notNull(),
		changeOn: day("change_on").notNull(),
		productId: uuid("product_id").notNull(),
		cases: smallint("cases").notNull(),
	},
	(t) => [
		primaryKey({
			name: "standing_order_changes_pk",
			columns: [t.producerId, t.standingOrderId, t.changeOn, t.productId],
		}),
		foreignKey({
			name: "standing_order_changes_line",
			columns: [t.producerId, t.standingOrderId, t.productId],
			foreignColumns: [standingOrderLines.producerId, standingOrderLines.standingOrderId, standingOrderLines.productId],
		}),
		check("standing_order_changes_sane", sql`${t.cases} between 0 and 999`),
	],
)
