import { sql } from "drizzle-orm"
import { check, foreignKey, index, pgTable, primaryKey, smallint, text, time, unique, uuid } from "drizzle-orm/pg-core"
import { day, id, producerId } from "./columns"
import { producers } from "./producers"
import { stores } from "./stores"

/** A weekly round of the van and the moment its orders close. */
export const deliveryRounds = pgTable(
	"delivery_rounds",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		name: text("name").notNull(),
		/** 1 = Monday … 7 = Sunday, as in ISO 8601. */
		weekday: smallint("weekday").notNull(),
		cutoffDaysBefore: smallint("cutoff_days_before").notNull(),
		cutoffTime: time("cutoff_time").notNull(),
	},
	(t) => [
		primaryKey({ name: "delivery_rounds_pk", columns: [t.producerId, t.id] }),
		unique("delivery_rounds_one_a_weekday").on(t.producerId, t.weekday),
		check("delivery_rounds_sane", sql`${t.weekday} between 1 and 7 and ${t.cutoffDaysBefore} between 0 and 14`),
	],
)

/** Which rounds stop at which store. */
export const storeRounds = pgTable(
	"store_rounds",
	{
		producerId: producerId().references(() => producers.id),
		storeId: uuid("store_id").notNull(),
		roundId: uuid("round_id").notNull(),
	},
	(t) => [
		primaryKey({ name: "store_rounds_pk", columns: [t.producerId, t.storeId, t.roundId] }),
		foreignKey({
			name: "store_rounds_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		foreignKey({
			name: "store_rounds_round",
			columns: [t.producerId, t.roundId],
			foreignColumns: [deliveryRounds.producerId, deliveryRounds.id],
		}),
		index("store_rounds_by_round").on(t.producerId, t.roundId),
	],
)

/** Days on which the yard does not deliver. */
export const shutDays = pgTable(
	"shut_days",
	{
		producerId: producerId().references(() => producers.id),
		shutOn: day("shut_on").notNull(),
		reason: text("reason").notNull().default(""),
	},
	(t) => [primaryKey({ name: "shut_days_pk", columns: [t.producerId, t.shutOn] })],
)
