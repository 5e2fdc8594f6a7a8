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
import { cents, day, id, producerId } from "./columns"
import { priceTiers, products } from "./pricing"
import { producers } from "./producers"
import { stores } from "./stores"

/** A price that one store has for itself, in place of its tier's. */
export const storePrices = pgTable(
	"store_prices",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		productId: uuid("product_id").notNull(),
		minCases: smallint("min_cases").notNull().default(1),
		caseCents: cents("case_cents").notNull(),
		poundCents: cents("pound_cents"),
		validFrom: day("valid_from").notNull(),
		/** The last day it holds; null = until another takes its place. */
		validUntil: day("valid_until"),
	},
	(t) => [
		primaryKey({ name: "store_prices_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "store_prices_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		foreignKey({
			name: "store_prices_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("store_prices_break_once").on(t.producerId, t.storeId, t.productId, t.minCases, t.validFrom),
		index("store_prices_by_product").on(t.producerId, t.productId),
		check("store_prices_sane", sql`${t.minCases} > 0 and ${t.caseCents} >= 0 and coalesce(${t.poundCents}, 0) >= 0`),
		check("store_prices_dates_in_order", sql`${t.validUntil} >= ${t.validFrom}`),
	],
)

/** So much off a product between two dates, for one tier or for all. */
export const promotions = pgTable(
	"promotions",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		name: text("name").notNull(),
		productId: uuid("product_id").notNull(),
		/** Null = every tier. */
		tierId: uuid("tier_id"),
		basisPoints: integer("basis_points").notNull(),
		startsOn: day("starts_on").notNull(),
		endsOn: day("ends_on").notNull(),
	},
	(t) => [
		primaryKey({ name: "promotions_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "promotions_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		foreignKey({
			name: "promotions_tier",
			columns: [t.producerId, t.tierId],
			foreignColumns: [priceTiers.producerId, priceTiers.id],
		}),
		index("promotions_by_product").on(t.producerId, t.productId, t.endsOn),
		check("promotions_sane", sql`${t.basisPoints} between 1 and 10000 and ${t.startsOn} <= ${t.endsOn}`),
	],
)
