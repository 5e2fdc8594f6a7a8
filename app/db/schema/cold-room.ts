import { sql } from "drizzle-orm"
import {
	boolean,
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
import { id, instant, producerId } from "./columns"
import { lots } from "./lots"
import { users } from "./people"
import { producers } from "./producers"

/** Lots that went into a freezer together and are treated together. */
export const freezerLoads = pgTable(
	"freezer_loads",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		/** Counted up by the producer: "Load 14". */
		number: integer("number").notNull(),
		freezer: text("freezer").notNull(),
		loadedAt: instant("loaded_at").notNull(),
		/** Set when a proof of the treatment was accepted. */
		provenAt: instant("proven_at"),
		loadedBy: uuid("loaded_by").references(() => users.id),
	},
	(t) => [
		primaryKey({ name: "freezer_loads_pk", columns: [t.producerId, t.id] }),
		unique("freezer_loads_number_once").on(t.producerId, t.number),
	],
)

/** A lot can be frozen more than once; pieces are those of the lot that lay in the load. */
export const freezerLoadLots = pgTable(
	"freezer_load_lots",
	{
		producerId: producerId().references(() => producers.id),
		loadId: uuid("load_id").notNull(),
		lotId: uuid("lot_id").notNull(),
		pieces: integer("pieces").notNull(),
	},
	(t) => [
		primaryKey({ name: "freezer_load_lots_pk", columns: [t.producerId, t.loadId, t.lotId] }),
		foreignKey({
			name: "freezer_load_lots_load",
			columns: [t.producerId, t.loadId],
			foreignColumns: [freezerLoads.producerId, freezerLoads.id],
		}),
		foreignKey({
			name: "freezer_load_lots_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		index("freezer_load_lots_by_lot").on(t.producerId, t.lotId),
		check("freezer_load_lots_positive", sql`${t.pieces} > 0`),
	],
)

/** A point of the curve: epoch milliseconds, and tenths of a degree Celsius lowest and highest in its stretch. */
export type CurvePoint = [at: number, lowest: number, highest: number]

/** A reading of the treatment, by hand or from a logger, and what it decided; never altered. */
export const freezeProofs = pgTable(
	"freeze_proofs",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		loadId: uuid("load_id").notNull(),
		kind: text("kind", { enum: ["entry", "logger"] }).notNull(),
		isAccepted: boolean("is_accepted").notNull(),
		/** The row of the table that decided, or came nearest: tenths of a degree Celsius. */
		rowTenthsC: smallint("row_tenths_c"),
		requiredMinutes: integer("required_minutes"),
		heldMinutes: integer("held_minutes").notNull(),
		/** Taken off what the probe says when it lay outside the comb. */
		allowanceMinutes: integer("allowance_minutes").notNull().default(0),
		runFrom: instant("run_from"),
		runTo: instant("run_to"),
		fileName: text("file_name").notNull().default(""),
		/** Rows, unit, gaps, clock steps: what the reader of the file reported. */
		report: jsonb("report").$type<Record<string, unknown>>().notNull().default({}),
		curve: jsonb("curve").$type<CurvePoint[]>().notNull().default([]),
		note: text("note").notNull().default(""),
		enteredBy: uuid("entered_by").references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "freeze_proofs_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "freeze_proofs_load",
			columns: [t.producerId, t.loadId],
			foreignColumns: [freezerLoads.producerId, freezerLoads.id],
		}),
		index("freeze_proofs_by_load").on(t.producerId, t.loadId, t.createdAt, t.id),
		check("freeze_proofs_minutes_not_negative", sql`${t.heldMinutes} >= 0 and ${t.allowanceMinutes} >= 0`),
	],
)

/** Why a lot was released: once, and for ever. A release by hand carries the owner's reason. */
export const lotReleases = pgTable(
	"lot_releases",
	{
		producerId: producerId().references(() => producers.id),
		lotId: uuid("lot_id").notNull(),
		kind: text("kind", { enum: ["proven", "by-hand"] }).notNull(),
		reason: text("reason").notNull().default(""),
		freezeProofId: uuid("freeze_proof_id"),
		netCheckId: uuid("net_check_id"),
		releasedBy: uuid("released_by").references(() => users.id),
		releasedAt: instant("released_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "lot_releases_pk", columns: [t.producerId, t.lotId] }),
		foreignKey({
			name: "lot_releases_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		check("lot_releases_kind_known", sql`${t.kind} in ('proven','by-hand')`),
		check("lot_releases_by_hand_has_reason", sql`${t.kind} = 'proven' or length(trim(${t.reason})) >= 10`),
		check(
			"lot_releases_proven_names_proofs",
			sql`${t.kind} = 'by-hand' or (${t.freezeProofId} is not null and ${t.netCheckId} is not null)`,
		),
	],
)
