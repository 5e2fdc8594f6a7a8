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
import { bytes, day, id, instant, producerId } from "./columns"
import { users } from "./people"
import { products } from "./pricing"
import { producers } from "./producers"

/** A place with hives. */
export const yards = pgTable(
	"yards",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		name: text("name").notNull(),
		/** What flowers there: "white clover". */
		flora: text("flora").notNull().default(""),
		isActive: boolean("is_active").notNull().default(true),
	},
	(t) => [
		primaryKey({ name: "yards_pk", columns: [t.producerId, t.id] }),
		unique("yards_name_once").on(t.producerId, t.name),
	],
)

export const hives = pgTable(
	"hives",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		yardId: uuid("yard_id").notNull(),
		/** As painted on the box: "12". */
		label: text("label").notNull(),
		isActive: boolean("is_active").notNull().default(true),
	},
	(t) => [
		primaryKey({ name: "hives_pk", columns: [t.producerId, t.id] }),
		foreignKey({ name: "hives_yard", columns: [t.producerId, t.yardId], foreignColumns: [yards.producerId, yards.id] }),
		unique("hives_label_once").on(t.producerId, t.label),
		index("hives_by_yard").on(t.producerId, t.yardId, t.label),
	],
)

/** A box of sections on a hive, from the day it is set on to the day it comes off. */
export const supers = pgTable(
	"supers",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		hiveId: uuid("hive_id").notNull(),
		/** The product its sections are built for. */
		productId: uuid("product_id").notNull(),
		capacityPieces: smallint("capacity_pieces").notNull().default(40),
		setOn: day("set_on").notNull(),
		/** Place in the stack when it was set on; 1 is next to the brood. */
		level: smallint("level").notNull().default(1),
		state: text("state", { enum: ["on", "clearing", "off"] })
			.notNull()
			.default("on"),
		/** The day the bee escape went in. */
		clearingOn: day("clearing_on"),
		offOn: day("off_on"),
		/** Set when it comes off: pieces fit to sell as sections, whatever their grade. */
		finishedPieces: smallint("finished_pieces"),
		harvestId: uuid("harvest_id"),
	},
	(t) => [
		primaryKey({ name: "supers_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "supers_hive",
			columns: [t.producerId, t.hiveId],
			foreignColumns: [hives.producerId, hives.id],
		}),
		foreignKey({
			name: "supers_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		foreignKey({
			name: "supers_harvest",
			columns: [t.producerId, t.harvestId],
			foreignColumns: [harvests.producerId, harvests.id],
		}),
		index("supers_by_hive").on(t.producerId, t.hiveId, t.level),
		index("supers_on_hives").on(t.producerId, t.productId, t.id).where(sql`state <> 'off'`),
		index("supers_by_harvest").on(t.producerId, t.harvestId),
		index("supers_off").on(t.producerId, t.offOn, t.id).where(sql`state = 'off'`),
		check("supers_state_known", sql`${t.state} in ('on','clearing','off')`),
		check("supers_capacity_sane", sql`${t.capacityPieces} between 1 and 400 and ${t.level} between 1 and 20`),
		check("supers_off_has_day", sql`(${t.state} = 'off') = (${t.offOn} is not null)`),
		check("supers_dates_in_order", sql`${t.offOn} >= ${t.setOn} and ${t.clearingOn} >= ${t.setOn}`),
		check("supers_finished_within_capacity", sql`${t.finishedPieces} between 0 and ${t.capacityPieces}`),
	],
)

/** A picture or file that a person gave us, re-encoded before it is kept; small enough to live beside its row. */
export const uploads = pgTable(
	"uploads",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		mediaType: text("media_type").notNull(),
		content: bytes("content").notNull(),
		width: integer("width"),
		height: integer("height"),
		uploadedBy: uuid("uploaded_by").references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "uploads_pk", columns: [t.producerId, t.id] }),
		check("uploads_size", sql`octet_length(${t.content}) between 1 and 4194304`),
	],
)

/** A look into a super. Its id is made on the phone, so that a check sent twice is one check. */
export const superChecks = pgTable(
	"super_checks",
	{
		producerId: producerId().references(() => producers.id),
		id: uuid("id").notNull(),
		superId: uuid("super_id").notNull(),
		checkedOn: day("checked_on").notNull(),
		/** Shares of all sections, in percent. Capped sections are filled. */
		filledPercent: smallint("filled_percent").notNull(),
		cappedPercent: smallint("capped_percent").notNull(),
		/** One digit a section, row by row: 0 bare, 1 begun, 2 filling, 3 full, 4 capped; empty when only shares were noted. */
		sections: text("sections").notNull().default(""),
		note: text("note").notNull().default(""),
		photoId: uuid("photo_id"),
		checkedBy: uuid("checked_by").references(() => users.id),
		/** When it reached us; a check made without signal comes later than it was made. */
		receivedAt: instant("received_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "super_checks_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "super_checks_super",
			columns: [t.producerId, t.superId],
			foreignColumns: [supers.producerId, supers.id],
		}),
		foreignKey({
			name: "super_checks_photo",
			columns: [t.producerId, t.photoId],
			foreignColumns: [uploads.producerId, uploads.id],
		}),
		index("super_checks_by_super").on(t.producerId, t.superId, t.checkedOn, t.receivedAt, t.id),
		check(
			"super_checks_shares_sane",
			sql`0 <= ${t.cappedPercent} and ${t.cappedPercent} <= ${t.filledPercent} and ${t.filledPercent} <= 100`,
		),
		check("super_checks_sections_form", sql`${t.sections} ~ '^[0-4]*$'`),
	],
)

/** What was expected, as it stood on a day: kept, so that forecasts can be held against what came off. */
export const cropForecasts = pgTable(
	"crop_forecasts",
	{
		producerId: producerId().references(() => producers.id),
		productId: uuid("product_id").notNull(),
		madeOn: day("made_on").notNull(),
		/** The Monday of the week in which the pieces should come off. */
		weekOn: day("week_on").notNull(),
		lowPieces: integer("low_pieces").notNull(),
		likelyPieces: integer("likely_pieces").notNull(),
		highPieces: integer("high_pieces").notNull(),
	},
	(t) => [
		primaryKey({ name: "crop_forecasts_pk", columns: [t.producerId, t.weekOn, t.productId, t.madeOn] }),
		foreignKey({
			name: "crop_forecasts_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		check(
			"crop_forecasts_in_order",
			sql`0 <= ${t.lowPieces} and ${t.lowPieces} <= ${t.likelyPieces} and ${t.likelyPieces} <= ${t.highPieces}`,
		),
	],
)

/** Supers taken off together and turned into lots. */
export const harvests = pgTable(
	"harvests",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		harvestedOn: day("harvested_on").notNull(),
		note: text("note").notNull().default(""),
		enteredBy: uuid("entered_by").references(() => users.id),
		/** Made with the form: a second send of the same form finds the first harvest. */
		idempotencyKey: uuid("idempotency_key").notNull().defaultRandom(),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "harvests_pk", columns: [t.producerId, t.id] }),
		unique("harvests_sent_once").on(t.producerId, t.idempotencyKey),
		index("harvests_by_day").on(t.producerId, t.harvestedOn, t.id),
	],
)
