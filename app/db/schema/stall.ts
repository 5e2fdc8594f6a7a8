import { sql } from "drizzle-orm"
import { check, foreignKey, index, integer, pgTable, primaryKey, text, time, unique, uuid } from "drizzle-orm/pg-core"
import { cents, day, id, instant, producerId } from "./columns"
import { lots } from "./lots"
import { users } from "./people"
import { products } from "./pricing"
import { producers } from "./producers"

export const markets = pgTable(
	"markets",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		name: text("name").notNull(),
		address: text("address").notNull().default(""),
		opensAt: time("opens_at").notNull(),
		closesAt: time("closes_at").notNull(),
		/** The Stripe Terminal reader that goes to this market; empty = none. */
		readerId: text("reader_id").notNull().default(""),
	},
	(t) => [
		primaryKey({ name: "markets_pk", columns: [t.producerId, t.id] }),
		unique("markets_name_once").on(t.producerId, t.name),
	],
)

export const marketDays = pgTable(
	"market_days",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		marketId: uuid("market_id").notNull(),
		marketOn: day("market_on").notNull(),
		state: text("state", { enum: ["planned", "open", "closed"] })
			.notNull()
			.default("planned"),
		floatCents: cents("float_cents").notNull().default(0),
	},
	(t) => [
		primaryKey({ name: "market_days_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "market_days_market",
			columns: [t.producerId, t.marketId],
			foreignColumns: [markets.producerId, markets.id],
		}),
		unique("market_days_once").on(t.producerId, t.marketId, t.marketOn),
		index("market_days_by_day").on(t.producerId, t.marketOn, t.id),
		check("market_days_state_known", sql`${t.state} in ('planned','open','closed')`),
		check("market_days_float_not_negative", sql`${t.floatCents} >= 0`),
	],
)

/** The volunteers of a day: they see this day and no other. */
export const marketDayPeople = pgTable(
	"market_day_people",
	{
		producerId: producerId().references(() => producers.id),
		marketDayId: uuid("market_day_id").notNull(),
		userId: uuid("user_id")
			.notNull()
			.references(() => users.id),
	},
	(t) => [
		primaryKey({ name: "market_day_people_pk", columns: [t.producerId, t.marketDayId, t.userId] }),
		foreignKey({
			name: "market_day_people_day",
			columns: [t.producerId, t.marketDayId],
			foreignColumns: [marketDays.producerId, marketDays.id],
		}),
		index("market_day_people_by_user").on(t.producerId, t.userId),
	],
)

/** A sale at the stall; its id is made on the phone, so that a second send finds the first. */
export const sales = pgTable(
	"sales",
	{
		producerId: producerId().references(() => producers.id),
		id: uuid("id").notNull(),
		marketDayId: uuid("market_day_id").notNull(),
		method: text("method", { enum: ["card", "cash"] }).notNull(),
		state: text("state", { enum: ["open", "paid", "given-up"] }).notNull(),
		totalCents: cents("total_cents").notNull(),
		/** Cash handed over; change is this less the total. */
		givenCents: cents("given_cents"),
		declineMessage: text("decline_message").notNull().default(""),
		/** Rises with each try, so that a declined card is tried again under a new idempotency key. */
		attempt: integer("attempt").notNull().default(1),
		stripePaymentIntentId: text("stripe_payment_intent_id"),
		/** What Stripe kept of a card sale, and the payout that brought the rest; null until known. */
		feeCents: cents("fee_cents"),
		stripePayoutId: text("stripe_payout_id"),
		soldBy: uuid("sold_by")
			.notNull()
			.references(() => users.id),
		soldAt: instant("sold_at").notNull().defaultNow(),
		paidAt: instant("paid_at"),
	},
	(t) => [
		primaryKey({ name: "sales_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "sales_market_day",
			columns: [t.producerId, t.marketDayId],
			foreignColumns: [marketDays.producerId, marketDays.id],
		}),
		unique("sales_card_payment_once").on(t.producerId, t.stripePaymentIntentId),
		index("sales_by_market_day").on(t.producerId, t.marketDayId, t.soldAt, t.id),
		check("sales_method_known", sql`${t.method} in ('card','cash')`),
		check("sales_state_known", sql`${t.state} in ('open','paid','given-up')`),
		check("sales_total_not_negative", sql`${t.totalCents} >= 0`),
		check("sales_cash_covers_total", sql`${t.method} <> 'cash' or ${t.givenCents} >= ${t.totalCents}`),
	],
)

export const saleLines = pgTable(
	"sale_lines",
	{
		producerId: producerId().references(() => producers.id),
		saleId: uuid("sale_id").notNull(),
		productId: uuid("product_id").notNull(),
		pieces: integer("pieces").notNull(),
		pieceCents: cents("piece_cents").notNull(),
	},
	(t) => [
		primaryKey({ name: "sale_lines_pk", columns: [t.producerId, t.saleId, t.productId] }),
		foreignKey({
			name: "sale_lines_sale",
			columns: [t.producerId, t.saleId],
			foreignColumns: [sales.producerId, sales.id],
		}),
		foreignKey({
			name: "sale_lines_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		check("sale_lines_sane", sql`${t.pieces} > 0 and ${t.pieceCents} >= 0`),
	],
)

/** Which pieces of which lot were sold: written with the sale, read by every trace and when a sale is given up. */
export const saleLineLots = pgTable(
	"sale_line_lots",
	{
		producerId: producerId().references(() => producers.id),
		saleId: uuid("sale_id").notNull(),
		productId: uuid("product_id").notNull(),
		lotId: uuid("lot_id").notNull(),
		pieces: integer("pieces").notNull(),
	},
	(t) => [
		primaryKey({ name: "sale_line_lots_pk", columns: [t.producerId, t.saleId, t.productId, t.lotId] }),
		foreignKey({
			name: "sale_line_lots_line",
			columns: [t.producerId, t.saleId, t.productId],
			foreignColumns: [saleLines.producerId, saleLines.saleId, saleLines.productId],
		}),
		foreignKey({
			name: "sale_line_lots_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("sale_line_lots_by_lot").on(t.producerId, t.lotId),
		check("sale_line_lots_positive", sql`${t.pieces} > 0`),
	],
)
