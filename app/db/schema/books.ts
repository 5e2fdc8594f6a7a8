import { sql } from "drizzle-orm"
import { check, jsonb, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core"
import { bookAccountKeys } from "../../domain/books/accounts"
import { day, id, instant, producerId } from "./columns"
import { users } from "./people"
import { producers } from "./producers"

/** How the bookkeeper names the accounts; one without a row keeps the name that it has by itself. */
export const bookAccounts = pgTable(
	"book_accounts",
	{
		producerId: producerId().references(() => producers.id),
		account: text("account", { enum: bookAccountKeys }).notNull(),
		number: text("number").notNull().default(""),
		name: text("name").notNull(),
	},
	(t) => [
		primaryKey({ name: "book_accounts_pk", columns: [t.producerId, t.account] }),
		check("book_accounts_known", sql`${t.account} in (${sql.raw(bookAccountKeys.map((key) => `'${key}'`).join(","))})`),
		check("book_accounts_named", sql`length(trim(${t.name})) between 1 and 120`),
	],
)

/** Until which day the books are closed: nothing that is dated on it or before is added any more. Never undone. */
export const bookClosings = pgTable(
	"book_closings",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		closedUntil: day("closed_until").notNull(),
		/** Debit and credit of each account as they stood, in cents. */
		totals: jsonb("totals").$type<Record<string, { debitCents: number; creditCents: number }>>().notNull(),
		closedBy: uuid("closed_by")
			.notNull()
			.references(() => users.id),
		closedAt: instant("closed_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "book_closings_pk", columns: [t.producerId, t.id] }),
		unique("book_closings_once").on(t.producerId, t.closedUntil),
	],
)
