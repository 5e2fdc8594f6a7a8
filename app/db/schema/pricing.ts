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
import { cents, day, grams, id, producerId } from "./columns"
import { producers } from "./producers"

/** A named price list; every store has one. */
export const priceTiers = pgTable(
	"price_tiers",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		name: text("name").notNull(),
	},
	(t) => [
		primaryKey({ name: "price_tiers_pk", columns: [t.producerId, t.id] }),
		unique("price_tiers_name_once").on(t.producerId, t.name),
	],
)

export const products = pgTable(
	"products",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		/** The number in the price list, "21". */
		code: text("code").notNull(),
		name: text("name").notNull(),
		form: text("form", {
			enum: ["round", "basswood", "clear-box", "cut-comb", "half-piece", "chunk", "frame"],
		}).notNull(),
		grade: text("grade").notNull().default(""),
		flora: text("flora").notNull().default(""),
		/** A honey colour of the drawings: straw, light, amber, dark. */
		colour: text("colour", { enum: ["straw", "light", "amber", "dark"] }).notNull(),
		/** Second line of a row: "Fancy, 8 oz". */
		detail: text("detail").notNull().default(""),
		pieceNetGrams: grams("piece_net_grams").notNull(),
		piecesPerCase: smallint("pieces_per_case").notNull(),
		/** Weight-priced comb is ordered by the piece and invoiced by its weighed net weight. */
		pricedBy: text("priced_by", { enum: ["case", "weight"] })
			.notNull()
			.default("case"),
		/** Breaks count the cases of all products of one family in an order. */
		breakFamily: text("break_family").notNull(),
		/** What the public pays for one piece; null = not sold singly. */
		pieceCents: cents("piece_cents"),
		/** Pieces kept back from stores for stall and shop. */
		reservePieces: integer("reserve_pieces").notNull().default(0),
		isTaxable: boolean("is_taxable").notNull().default(false),
		isActive: boolean("is_active").notNull().default(true),
	},
	(t) => [
		primaryKey({ name: "products_pk", columns: [t.producerId, t.id] }),
		unique("products_code_once").on(t.producerId, t.code),
		check(
			"products_form_known",
			sql`${t.form} in ('round','basswood','clear-box','cut-comb','half-piece','chunk','frame')`,
		),
		check("products_sizes_positive", sql`${t.pieceNetGrams} > 0 and ${t.piecesPerCase} > 0`),
		check("products_money_not_negative", sql`coalesce(${t.pieceCents}, 0) >= 0 and ${t.reservePieces} >= 0`),
	],
)

/** One price break: what a case costs in a tier from `min_cases` up, from a day on. */
export const prices = pgTable(
	"prices",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		tierId: uuid("tier_id").notNull(),
		productId: uuid("product_id").notNull(),
		minCases: smallint("min_cases").notNull().default(1),
		/** For comb priced by weight the estimate for a case; what is invoiced follows from `pound_cents` and the scale. */
		caseCents: cents("case_cents").notNull(),
		/** Set where the product is priced by weight. */
		poundCents: cents("pound_cents"),
		validFrom: day("valid_from").notNull(),
	},
	(t) => [
		primaryKey({ name: "prices_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "prices_tier",
			columns: [t.producerId, t.tierId],
			foreignColumns: [priceTiers.producerId, priceTiers.id],
		}),
		foreignKey({
			name: "prices_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("prices_break_once").on(t.producerId, t.tierId, t.productId, t.minCases, t.validFrom),
		index("prices_by_product").on(t.producerId, t.productId),
		check("prices_sane", sql`${t.minCases} > 0 and ${t.caseCents} >= 0 and coalesce(${t.poundCents}, 0) >= 0`),
	],
)
