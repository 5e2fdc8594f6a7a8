import { sql } from "drizzle-orm"
import { check, foreignKey, index, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core"
import { id, instant, producerId } from "./columns"
import { users } from "./people"
import { producers } from "./producers"
import { stores } from "./stores"

/** A person's role at a producer, or at one of the producer's stores. */
export const memberships = pgTable(
	"memberships",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		userId: uuid("user_id")
			.notNull()
			.references(() => users.id),
		role: text("role", { enum: ["owner", "desk", "packer", "stall", "buyer", "payer"] }).notNull(),
		storeId: uuid("store_id"),
		/** Letters that a person of a store has asked not to get; see domain/people/letters.ts. */
		lettersOff: text("letters_off").array().notNull().default([]),
		createdAt: instant("created_at").notNull().defaultNow(),
		endedAt: instant("ended_at"),
	},
	(t) => [
		primaryKey({ name: "memberships_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "memberships_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		unique("memberships_role_once").on(t.producerId, t.userId, t.role, t.storeId).nullsNotDistinct(),
		index("memberships_by_user").on(t.userId),
		check("memberships_role_known", sql`${t.role} in ('owner','desk','packer','stall','buyer','payer')`),
		check("memberships_store_roles_name_a_store", sql`(${t.role} in ('buyer','payer')) = (${t.storeId} is not null)`),
	],
)

export const invitations = pgTable(
	"invitations",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		email: text("email").notNull(),
		name: text("name").notNull(),
		role: text("role", { enum: ["owner", "desk", "packer", "stall", "buyer", "payer"] }).notNull(),
		storeId: uuid("store_id"),
		tokenHash: text("token_hash").notNull(),
		invitedBy: uuid("invited_by")
			.notNull()
			.references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
		expiresAt: instant("expires_at").notNull(),
		acceptedAt: instant("accepted_at"),
	},
	(t) => [
		primaryKey({ name: "invitations_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "invitations_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		unique("invitations_token_once").on(t.producerId, t.tokenHash),
		check("invitations_email_lower_case", sql`${t.email} = lower(${t.email})`),
		check("invitations_store_roles_name_a_store", sql`(${t.role} in ('buyer','payer')) = (${t.storeId} is not null)`),
	],
)
