import { sql } from "drizzle-orm"
import {
	check,
	foreignKey,
	index,
	integer,
	jsonb,
	pgTable,
	primaryKey,
	smallint,
	text,
	unique,
	uuid,
} from "drizzle-orm/pg-core"
import type { Claim } from "~/domain/sharing/share-out"
import { day, id, instant, producerId } from "./columns"
import { orderLines } from "./orders"
import { users } from "./people"
import { products } from "./pricing"
import { producers } from "./producers"
import { stores } from "./stores"

/** One product of one day shared out, stored whole: what was there, who asked, by which rule, and what came of it. */
export const sharingRuns = pgTable(
	"sharing_runs",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		productId: uuid("product_id").notNull(),
		deliveryOn: day("delivery_on").notNull(),
		rule: text("rule", { enum: ["equal-shares", "in-proportion", "equal-shortfall"] }).notNull(),
		supplyCases: integer("supply_cases").notNull(),
		/** The claims as they stood, so that the run can be shown again. */
		claims: jsonb("claims").$type<Claim[]>().notNull(),
		note: text("note").notNull().default(""),
		state: text("state", { enum: ["told", "undone"] })
			.notNull()
			.default("told"),
		sharedBy: uuid("shared_by")
			.notNull()
			.references(() => users.id),
		sharedAt: instant("shared_at").notNull().defaultNow(),
		/** Made with the form: a second send of the same form finds the first run. */
		idempotencyKey: uuid("idempotency_key").notNull().defaultRandom(),
	},
	(t) => [
		primaryKey({ name: "sharing_runs_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "sharing_runs_product",
			columns: [t.producerId, t.productId],
			foreignColumns: [products.producerId, products.id],
		}),
		unique("sharing_runs_sent_once").on(t.producerId, t.idempotencyKey),
		index("sharing_runs_by_product").on(t.producerId, t.productId, t.deliveryOn),
		index("sharing_runs_by_time").on(t.producerId, t.sharedAt, t.id),
		check("sharing_runs_rule_known", sql`${t.rule} in ('equal-shares','in-proportion','equal-shortfall')`),
		check("sharing_runs_state_known", sql`${t.state} in ('told','undone')`),
		check("sharing_runs_supply_not_negative", sql`${t.supplyCases} >= 0`),
	],
)

/** What one line of one store got in a run, and the sentence the store reads. */
export const sharingShares = pgTable(
	"sharing_shares",
	{
		producerId: producerId().references(() => producers.id),
		runId: uuid("run_id").notNull(),
		orderLineId: uuid("order_line_id").notNull(),
		storeId: uuid("store_id").notNull(),
		askedCases: smallint("asked_cases").notNull(),
		/** What the rule gives; `given_cases` differs where the producer changed it by hand. */
		ruleCases: smallint("rule_cases").notNull(),
		givenCases: smallint("given_cases").notNull(),
		sentence: text("sentence").notNull(),
	},
	(t) => [
		primaryKey({ name: "sharing_shares_pk", columns: [t.producerId, t.runId, t.orderLineId] }),
		foreignKey({
			name: "sharing_shares_run",
			columns: [t.producerId, t.runId],
			foreignColumns: [sharingRuns.producerId, sharingRuns.id],
		}),
		foreignKey({
			name: "sharing_shares_line",
			columns: [t.producerId, t.orderLineId],
			foreignColumns: [orderLines.producerId, orderLines.id],
		}),
		foreignKey({
			name: "sharing_shares_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		index("sharing_shares_by_store").on(t.producerId, t.storeId, t.runId),
		index("sharing_shares_by_line").on(t.producerId, t.orderLineId),
		check(
			"sharing_shares_within_asked",
			sql`${t.ruleCases} between 0 and ${t.askedCases} and ${t.givenCases} between 0 and ${t.askedCases}`,
		),
	],
)
