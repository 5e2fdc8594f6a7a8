import { sql } from "drizzle-orm"
import { check, foreignKey, index, integer, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core"
import { day, id, instant, producerId } from "./columns"
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
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "lots_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "lots_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("lots_code_once").on(t.producerId, t.code),
		index("lots_by_product").on(t.producerId, t.productId, t.state, t.bestBeforeOn),
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
