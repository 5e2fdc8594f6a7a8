import { boolean, foreignKey, index, jsonb, pgTable, primaryKey, text, uuid } from "drizzle-orm/pg-core"
import type { NetContentsInput, NetContentsWorksheet } from "~/domain/scale/net-contents"
import { day, id, instant, producerId } from "./columns"
import { lots } from "./lots"
import { users } from "./people"
import { producers } from "./producers"

/** A check of the net contents of a lot: what was weighed and every step to the decision; never altered. */
export const netChecks = pgTable(
	"net_checks",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		lotId: uuid("lot_id").notNull(),
		checkedOn: day("checked_on").notNull(),
		input: jsonb("input").$type<NetContentsInput>().notNull(),
		worksheet: jsonb("worksheet").$type<NetContentsWorksheet>().notNull(),
		hasPassed: boolean("has_passed").notNull(),
		note: text("note").notNull().default(""),
		checkedBy: uuid("checked_by").references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "net_checks_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "net_checks_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("net_checks_by_lot").on(t.producerId, t.lotId, t.createdAt, t.id),
	],
)
