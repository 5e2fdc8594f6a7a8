import { sql } from "drizzle-orm"
import {
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
import { day, id, instant, producerId } from "./columns"
import { harvests } from "./crop"
import { products } from "./pricing"
import { producers } from "./producers"

/** Pieces of one product from one harvest that share a history. */
export const lots = pgTable(
	"lots",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		code: text("code").notNull(),
		productId: uuid("product_id").notNull(),
		state: text("state", { enum: ["held", "released", "withdrawn"] })
			.notNull()
			.default("held"),
		harvestedOn: day("harvested_on").notNull(),
		/** When a held lot is likely to be released: it counts as supply from that day. */
		expectedReleaseOn: day("expected_release_on").notNull(),
		bestBeforeOn: day("best_before_on").notNull(),
		piecesHarvested: integer("pieces_harvested").notNull(),
		yard: text("yard").notNull().default(""),
		/** Null for a lot that was split off, merged, cut from culls, or entered without a harvest. */
		harvestId: uuid("harvest_id"),
		/** As graded; "Culls" are not sold as sections. */
		grade: text("grade").notNull().default(""),
		flora: text("flora").notNull().default(""),
		/** Tenths of a percent of water; 186 is 18.6 %. */
		moistureTenths: smallint("moisture_tenths"),
		/** The Pfund reading in tenths of a millimetre. */
		pfundTenths: smallint("pfund_tenths"),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "lots_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "lots_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		foreignKey({
			name: "lots_harvest",
			columns: [t.producerId, t.harvestId],
			foreignColumns: [harvests.producerId, harvests.id],
		}),
		unique("lots_code_once").on(t.producerId, t.code),
		index("lots_by_harvest").on(t.producerId, t.harvestId),
		index("lots_by_harvest_day").on(t.producerId, t.harvestedOn, t.code),
		index("lots_by_product").on(t.producerId, t.productId, t.state, t.bestBeforeOn),
		check("lots_readings_sane", sql`${t.moistureTenths} between 100 and 400 and ${t.pfundTenths} between 0 and 2000`),
		check("lots_state_known", sql`${t.state} in ('held','released','withdrawn')`),
		check("lots_pieces_positive", sql`${t.piecesHarvested} > 0`),
		check(
			"lots_dates_in_order",
			sql`${t.harvestedOn} <= ${t.expectedReleaseOn} and ${t.expectedReleaseOn} <= ${t.bestBeforeOn}`,
		),
	],
)

/** Pieces likely to come off the hives, low, likely and high, by day. */
export const expectedSupplies = pgTable(
	"expected_supplies",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		productId: uuid("product_id").notNull(),
		expectedOn: day("expected_on").notNull(),
		lowPieces: integer("low_pieces").notNull(),
		likelyPieces: integer("likely_pieces").notNull(),
		highPieces: integer("high_pieces").notNull(),
	},
	(t) => [
		primaryKey({ name: "expected_supplies_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "expected_supplies_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("expected_supplies_once_a_day").on(t.producerId, t.productId, t.expectedOn),
		check(
			"expected_supplies_in_order",
			sql`0 <= ${t.lowPieces} and ${t.lowPieces} <= ${t.likelyPieces} and ${t.likelyPieces} <= ${t.highPieces}`,
		),
	],
)

/**
 * How lots come from one another: split, merged, or cut up into another product. `pieces` left the one and stand there
 * under "other-lot" or "cut-up"; `piecesMade` came into the other.
 */
export const lotLinks = pgTable(
	"lot_links",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		fromLotId: uuid("from_lot_id").notNull(),
		toLotId: uuid("to_lot_id").notNull(),
		kind: text("kind", { enum: ["split", "merge", "cut-up"] }).notNull(),
		pieces: integer("pieces").notNull(),
		piecesMade: integer("pieces_made").notNull(),
		/** Weight that went in and came out as neither: drained honey, trimmings. */
		lossGrams: integer("loss_grams").notNull().default(0),
		at: instant("at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "lot_links_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "lot_links_from",
			columns: [t.producerId, t.fromLotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		foreignKey({
			name: "lot_links_to",
			columns: [t.producerId, t.toLotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("lot_links_by_from").on(t.producerId, t.fromLotId),
		index("lot_links_by_to").on(t.producerId, t.toLotId),
		check("lot_links_kind_known", sql`${t.kind} in ('split','merge','cut-up')`),
		check("lot_links_another_lot", sql`${t.fromLotId} <> ${t.toLotId}`),
		check("lot_links_pieces_sane", sql`${t.pieces} > 0 and ${t.piecesMade} >= 0 and ${t.lossGrams} >= 0`),
		check("lot_links_regrouping_keeps_pieces", sql`${t.kind} = 'cut-up' or ${t.pieces} = ${t.piecesMade}`),
	],
)
