import { sql } from "drizzle-orm"
import { bigint, boolean, check, integer, pgTable, primaryKey, smallint, text, unique, uuid } from "drizzle-orm/pg-core"
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

export const producerSettings = pgTable(
	"producer_settings",
	{
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
		/** A super is ready at this capped share; common practice, no source. */
		readyCappedPercent: smallint("ready_capped_percent").notNull().default(90),
		/** Which figure of the crop counts as supply. */
		cropFigure: text("crop_figure", { enum: ["low", "likely"] })
			.notNull()
			.default("low"),
		/** "{product}{yy}-{nnn}": the tokens are explained in domain/lots/lot-code.ts. */
		lotCodePattern: text("lot_code_pattern").notNull().default("{product}{yy}-{nnn}"),
		/** Days from harvest to best before. */
		bestBeforeDays: smallint("best_before_days").notNull().default(300),
		/** Who carries what is delivered; named in the records that an inspector may ask for. */
		carrier: text("carrier").notNull().default("own van"),
		/** Days after delivery in which broken comb may be reported; common practice, no source. */
		breakageDays: smallint("breakage_days").notNull().default(3),
		/** Reminders of invoices go out by themselves. */
		remindersOn: boolean("reminders_on").notNull().default(true),
		/** Charged each month on what is overdue; 0 = no finance charge. */
		financeChargeBasisPoints: integer("finance_charge_basis_points").notNull().default(0),
		/** Days past due before a finance charge is reckoned. */
		financeChargeAfterDays: smallint("finance_charge_after_days").notNull().default(30),
	},
	(t) => [
		check(
			"producer_settings_crop_sane",
			sql`${t.readyCappedPercent} between 1 and 100 and ${t.cropFigure} in ('low','likely')`,
		),
		check(
			"producer_settings_invoicing_sane",
			sql`${t.breakageDays} between 0 and 60 and ${t.financeChargeBasisPoints} between 0 and 1000 and ${t.financeChargeAfterDays} between 0 and 365`,
		),
		check("producer_settings_best_before_sane", sql`${t.bestBeforeDays} between 1 and 1500`),
	],
)

/** Gapless numbers: one row for each series and year; its lock makes two transactions wait, so none is skipped. */
export const counters = pgTable(
	"counters",
	{
		producerId: producerId().references(() => producers.id),
		series: text("series", { enum: ["order", "invoice", "credit", "lot", "load", "withdrawal"] }).notNull(),
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
