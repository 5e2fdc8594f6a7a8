import { sql } from "drizzle-orm"
import {
	bigint,
	check,
	index,
	integer,
	jsonb,
	pgTable,
	primaryKey,
	text,
	unique,
	uuid,
	varchar,
} from "drizzle-orm/pg-core"
import { id, instant, producerId } from "./columns"
import { producers } from "./producers"

/** A person; belongs to no producer, since one may work at several and buy for several stores. */
export const users = pgTable(
	"users",
	{
		id: uuid("id").primaryKey().defaultRandom(),
		email: text("email").notNull(),
		name: text("name").notNull(),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [unique("users_email_once").on(t.email), check("users_email_lower_case", sql`${t.email} = lower(${t.email})`)],
)

/** A signed-in browser. Only a hash of the cookie's token is kept. */
export const sessions = pgTable(
	"sessions",
	{
		id: uuid("id").primaryKey().defaultRandom(),
		userId: uuid("user_id")
			.notNull()
			.references(() => users.id, { onDelete: "cascade" }),
		tokenHash: text("token_hash").notNull(),
		userAgent: text("user_agent").notNull().default(""),
		createdAt: instant("created_at").notNull().defaultNow(),
		lastSeenAt: instant("last_seen_at").notNull().defaultNow(),
		expiresAt: instant("expires_at").notNull(),
		endedAt: instant("ended_at"),
	},
	(t) => [unique("sessions_token_once").on(t.tokenHash), index("sessions_by_user").on(t.userId, t.createdAt)],
)

/** The authority over mailed sign-in codes: address, tries and single use are decided here, not in a cookie. */
export const loginCodes = pgTable(
	"login_codes",
	{
		id: uuid("id").primaryKey().defaultRandom(),
		email: text("email").notNull(),
		codeHash: text("code_hash").notNull(),
		linkHash: text("link_hash").notNull(),
		attempts: integer("attempts").notNull().default(0),
		createdAt: instant("created_at").notNull().defaultNow(),
		expiresAt: instant("expires_at").notNull(),
		usedAt: instant("used_at"),
	},
	(t) => [
		index("login_codes_by_email").on(t.email, t.createdAt),
		unique("login_codes_link_once").on(t.linkHash),
		check("login_codes_five_tries", sql`${t.attempts} between 0 and 5`),
	],
)

/** Counters of rate-limiter-flexible, in the shape that package expects. */
export const rateLimits = pgTable("rate_limits", {
	key: varchar("key", { length: 255 }).primaryKey(),
	points: integer("points").notNull().default(0),
	expire: bigint("expire", { mode: "number" }),
})

/** What a person had typed when their session ended: offered again after they sign in. */
export const keptPosts = pgTable(
	"kept_posts",
	{
		id: uuid("id").primaryKey().defaultRandom(),
		path: text("path").notNull(),
		fields: jsonb("fields").$type<[string, string][]>().notNull(),
		createdAt: instant("created_at").notNull().defaultNow(),
		expiresAt: instant("expires_at").notNull(),
	},
	(t) => [index("kept_posts_by_expiry").on(t.expiresAt)],
)

/** Everything a person changed: append-only, the application may add but never alter. */
export const auditEntries = pgTable(
	"audit_entries",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		at: instant("at").notNull().defaultNow(),
		userId: uuid("user_id").references(() => users.id),
		action: text("action").notNull(),
		subjectType: text("subject_type").notNull(),
		subjectId: uuid("subject_id").notNull(),
		detail: jsonb("detail").$type<Record<string, unknown>>().notNull().default({}),
	},
	(t) => [
		primaryKey({ name: "audit_entries_pk", columns: [t.producerId, t.id] }),
		index("audit_entries_by_time").on(t.producerId, t.at, t.id),
		index("audit_entries_by_subject").on(t.producerId, t.subjectType, t.subjectId, t.at),
	],
)
