import { sql } from "drizzle-orm"
import { bigint, check, integer, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core"
import { instant, producerId } from "./columns"

/** What anyone may know of a producer: the name in the URL and above the shop. All else is in `producer_settings`. */
export const producers = pgTable(
	"producers",
	{
		id: uuid("id").primaryKey().defaultRandom(),
		slug: text("slug").notNull(),
		name: text("name").notNull(),
		county: text("county").notNull().default(""),
		timeZone: text("time_zone").notNull(),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		unique("producers_slug_once").on(t.slug),
		check("producers_slug_form", sql`${t.slug} ~ '^[a-z0-9]+(-[a-z0-9]+)*$'`),
	],
)

export const producerSettings = pgTable("producer_settings", {
	producerId: producerId()
		.primaryKey()
		.references(() => producers.id),
	address: text("address").notNull().default(""),
	email: text("email").notNull(),
	phone: text("phone").notNull().default(""),
	/** Headline and words of the public shop. */
	shopHeadline: text("shop_headline").notNull().default(""),
	shopWords: text("shop_words").notNull().default(""),
	/** Stands at the foot of invoices: what to do about broken comb, how the comb was frozen. */
	invoiceNote: text("invoice_note").notNull().default(""),
	contactName: text("contact_name").notNull().default(""),
	/** Charged on taxable products to stores without a valid resale certificate. */
	salesTaxBasisPoints: integer("sales_tax_basis_points").notNull().default(0),
})

/** Gapless numbers: one row for each series and year; its lock makes two transactions wait, so none is skipped. */
export const counters = pgTable(
	"counters",
	{
		producerId: producerId().references(() => producers.id),
		series: text("series", { enum: ["order", "invoice"] }).notNull(),
		year: integer("year").notNull(),
		last: integer("last").notNull().default(0),
	},
	(t) => [primaryKey({ name: "counters_pk", columns: [t.producerId, t.series, t.year] })],
)

/** Rises whenever something the public shop shows has changed; a rendered copy is good for one version only. */
export const shopVersions = pgTable("shop_versions", {
	producerId: producerId()
		.primaryKey()
		.references(() => producers.id),
	version: bigint("version", { mode: "number" }).notNull().default(1),
})
