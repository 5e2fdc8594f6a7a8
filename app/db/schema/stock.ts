import { sql } from "drizzle-orm"
import { check, foreignKey, index, integer, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core"
import { day, id, instant, NO_REF, producerId } from "./columns"
import { lots } from "./lots"
import { users } from "./people"
import { producers } from "./producers"

const places = [
	"cold-room",
	"ready",
	"packed",
	"van",
	"market",
	"sold",
	"waste",
	"cut-up",
	"other-lot",
	"missing",
] as const
const placeList = sql.raw(places.map((p) => `'${p}'`).join(","))

/**
 * Append-only moves of pieces of a lot between places; `from_place` is null when they come off the hives.
 * A reference names the order (packed, sold), the market day (market, sold) or the lot (other-lot) that a place is about.
 * Balances follow by a trigger in the same transaction; the application may neither alter a move nor write a balance.
 */
export const stockMoves = pgTable(
	"stock_moves",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		lotId: uuid("lot_id").notNull(),
		fromPlace: text("from_place", { enum: places }),
		fromRef: uuid("from_ref").notNull().default(NO_REF),
		toPlace: text("to_place", { enum: places }).notNull(),
		toRef: uuid("to_ref").notNull().default(NO_REF),
		pieces: integer("pieces").notNull(),
		reason: text("reason").notNull(),
		movedBy: uuid("moved_by").references(() => users.id),
		movedAt: instant("moved_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "stock_moves_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "stock_moves_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("stock_moves_by_lot").on(t.producerId, t.lotId, t.movedAt, t.id),
		index("stock_moves_by_ref").on(t.producerId, t.toRef).where(sql`to_ref <> '00000000-0000-0000-0000-000000000000'`),
		check("stock_moves_pieces_positive", sql`${t.pieces} > 0`),
		check(
			"stock_moves_places_known",
			sql`${t.toPlace} in (${placeList}) and coalesce(${t.fromPlace}, 'ready') in (${placeList})`,
		),
		check("stock_moves_go_somewhere", sql`${t.fromPlace} is distinct from ${t.toPlace} or ${t.fromRef} <> ${t.toRef}`),
	],
)

export const stockBalances = pgTable(
	"stock_balances",
	{
		producerId: producerId().references(() => producers.id),
		lotId: uuid("lot_id").notNull(),
		place: text("place", { enum: places }).notNull(),
		placeRef: uuid("place_ref").notNull().default(NO_REF),
		pieces: integer("pieces").notNull(),
	},
	(t) => [
		primaryKey({ name: "stock_balances_pk", columns: [t.producerId, t.lotId, t.place, t.placeRef] }),
		foreignKey({
			name: "stock_balances_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("stock_balances_by_place").on(t.producerId, t.place, t.placeRef),
		// Most places of most lots are empty by now: what lies somewhere is found without them.
		index("stock_balances_on_hand").on(t.producerId, t.place, t.lotId).where(sql`pieces > 0`),
		check("stock_balances_not_negative", sql`${t.pieces} >= 0`),
	],
)

/** A count of one place against the ledger; its differences are posted as moves. */
export const stockTakes = pgTable(
	"stock_takes",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		place: text("place", { enum: places }).notNull(),
		placeRef: uuid("place_ref").notNull().default(NO_REF),
		takenOn: day("taken_on").notNull(),
		takenBy: uuid("taken_by").references(() => users.id),
		postedAt: instant("posted_at").notNull().defaultNow(),
		/** Made with the form: a second send of the same form finds the first stock-take. */
		idempotencyKey: uuid("idempotency_key").notNull().defaultRandom(),
	},
	(t) => [
		primaryKey({ name: "stock_takes_pk", columns: [t.producerId, t.id] }),
		unique("stock_takes_sent_once").on(t.producerId, t.idempotencyKey),
		index("stock_takes_by_time").on(t.producerId, t.postedAt, t.id),
	],
)

export const stockTakeLines = pgTable(
	"stock_take_lines",
	{
		producerId: producerId().references(() => producers.id),
		stockTakeId: uuid("stock_take_id").notNull(),
		lotId: uuid("lot_id").notNull(),
		countedPieces: integer("counted_pieces").notNull(),
		/** What the ledger said at that moment. */
		ledgerPieces: integer("ledger_pieces").notNull(),
	},
	(t) => [
		primaryKey({ name: "stock_take_lines_pk", columns: [t.producerId, t.stockTakeId, t.lotId] }),
		foreignKey({
			name: "stock_take_lines_take",
			columns: [t.producerId, t.stockTakeId],
			foreignColumns: [stockTakes.producerId, stockTakes.id],
		}),
		foreignKey({
			name: "stock_take_lines_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("stock_take_lines_by_lot").on(t.producerId, t.lotId),
		check("stock_take_lines_not_negative", sql`${t.countedPieces} >= 0 and ${t.ledgerPieces} >= 0`),
	],
)
