import { sql } from "drizzle-orm"
import { check, foreignKey, index, integer, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core"
import { id, instant, producerId } from "./columns"
import { lots } from "./lots"
import { users } from "./people"
import { producers } from "./producers"
import { stores } from "./stores"

/** Lots called back: what is left is held, and those who had them are told. */
export const withdrawals = pgTable(
	"withdrawals",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		number: integer("number").notNull(),
		reason: text("reason").notNull(),
		/** What those who hold pieces should do with them. */
		instructions: text("instructions").notNull(),
		startedBy: uuid("started_by").references(() => users.id),
		startedAt: instant("started_at").notNull().defaultNow(),
		/** Made with the form: a second send of the same form finds the first withdrawal. */
		idempotencyKey: uuid("idempotency_key").notNull().defaultRandom(),
	},
	(t) => [
		primaryKey({ name: "withdrawals_pk", columns: [t.producerId, t.id] }),
		unique("withdrawals_number_once").on(t.producerId, t.number),
		unique("withdrawals_sent_once").on(t.producerId, t.idempotencyKey),
	],
)

export const withdrawalLots = pgTable(
	"withdrawal_lots",
	{
		producerId: producerId().references(() => producers.id),
		withdrawalId: uuid("withdrawal_id").notNull(),
		lotId: uuid("lot_id").notNull(),
		/** Pieces that had left when it began. */
		piecesOut: integer("pieces_out").notNull(),
	},
	(t) => [
		primaryKey({ name: "withdrawal_lots_pk", columns: [t.producerId, t.withdrawalId, t.lotId] }),
		foreignKey({
			name: "withdrawal_lots_withdrawal",
			columns: [t.producerId, t.withdrawalId],
			foreignColumns: [withdrawals.producerId, withdrawals.id],
		}),
		foreignKey({
			name: "withdrawal_lots_lot",
			columns: [t.producerId, t.lotId],
			foreignColumns: [lots.producerId, lots.id],
		}),
		unique("withdrawal_lots_once").on(t.producerId, t.lotId),
	],
)

/** One notice to one store: how much it had, whether it was opened, what it answered. */
export const withdrawalNotices = pgTable(
	"withdrawal_notices",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		withdrawalId: uuid("withdrawal_id").notNull(),
		storeId: uuid("store_id").notNull(),
		pieces: integer("pieces").notNull(),
		/** Only a hash of the link's secret is kept. */
		tokenHash: text("token_hash").notNull(),
		openedAt: instant("opened_at"),
		answeredAt: instant("answered_at"),
		/** Pieces the store still holds, by its own answer. */
		heldPieces: integer("held_pieces"),
		answerNote: text("answer_note").notNull().default(""),
	},
	(t) => [
		primaryKey({ name: "withdrawal_notices_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "withdrawal_notices_withdrawal",
			columns: [t.producerId, t.withdrawalId],
			foreignColumns: [withdrawals.producerId, withdrawals.id],
		}),
		foreignKey({
			name: "withdrawal_notices_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		unique("withdrawal_notices_one_a_store").on(t.producerId, t.withdrawalId, t.storeId),
		unique("withdrawal_notices_token_once").on(t.producerId, t.tokenHash),
		index("withdrawal_notices_by_store").on(t.producerId, t.storeId),
		check("withdrawal_notices_sane", sql`${t.pieces} > 0 and ${t.heldPieces} between 0 and ${t.pieces}`),
		check("withdrawal_notices_answer_whole", sql`(${t.answeredAt} is null) = (${t.heldPieces} is null)`),
	],
)
