import { sql } from "drizzle-orm"
import {
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
import { bytes, id, instant, producerId } from "./columns"
import { invoiceLines, invoices } from "./invoicing"
import { credits } from "./payments"
import { users } from "./people"
import { producers } from "./producers"
import { stores } from "./stores"

/** Comb that arrived broken, as the store told it; one report is answered once. Its id is made with the form. */
export const breakageReports = pgTable(
	"breakage_reports",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		storeId: uuid("store_id").notNull(),
		invoiceId: uuid("invoice_id").notNull(),
		state: text("state", { enum: ["open", "accepted", "part-accepted", "declined"] })
			.notNull()
			.default("open"),
		note: text("note").notNull().default(""),
		/** The producer's sentence. */
		answer: text("answer").notNull().default(""),
		creditId: uuid("credit_id"),
		reportedBy: uuid("reported_by")
			.notNull()
			.references(() => users.id),
		reportedAt: instant("reported_at").notNull().defaultNow(),
		answeredBy: uuid("answered_by").references(() => users.id),
		answeredAt: instant("answered_at"),
	},
	(t) => [
		primaryKey({ name: "breakage_reports_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "breakage_reports_store",
			columns: [t.producerId, t.storeId],
			foreignColumns: [stores.producerId, stores.id],
		}),
		foreignKey({
			name: "breakage_reports_invoice",
			columns: [t.producerId, t.invoiceId],
			foreignColumns: [invoices.producerId, invoices.id],
		}),
		foreignKey({
			name: "breakage_reports_credit",
			columns: [t.producerId, t.creditId],
			foreignColumns: [credits.producerId, credits.id],
		}),
		index("breakage_reports_by_invoice").on(t.producerId, t.invoiceId),
		index("breakage_reports_by_day").on(t.producerId, t.reportedAt, t.id),
		index("breakage_reports_open").on(t.producerId, t.reportedAt, t.id).where(sql`state = 'open'`),
		check("breakage_reports_state_known", sql`${t.state} in ('open','accepted','part-accepted','declined')`),
		check("breakage_reports_answer_whole", sql`(${t.state} = 'open') = (${t.answeredAt} is null)`),
		check(
			"breakage_reports_credit_follows",
			sql`(${t.state} in ('accepted','part-accepted')) = (${t.creditId} is not null)`,
		),
	],
)

export const breakageLines = pgTable(
	"breakage_lines",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		reportId: uuid("report_id").notNull(),
		invoiceLineId: uuid("invoice_line_id").notNull(),
		pieces: integer("pieces").notNull(),
		note: text("note").notNull().default(""),
		/** Null until the producer has answered. */
		acceptedPieces: integer("accepted_pieces"),
	},
	(t) => [
		primaryKey({ name: "breakage_lines_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "breakage_lines_report",
			columns: [t.producerId, t.reportId],
			foreignColumns: [breakageReports.producerId, breakageReports.id],
		}),
		foreignKey({
			name: "breakage_lines_invoice_line",
			columns: [t.producerId, t.invoiceLineId],
			foreignColumns: [invoiceLines.producerId, invoiceLines.id],
		}),
		unique("breakage_lines_once").on(t.producerId, t.reportId, t.invoiceLineId),
		index("breakage_lines_by_invoice_line").on(t.producerId, t.invoiceLineId),
		check("breakage_lines_sane", sql`${t.pieces} > 0 and ${t.acceptedPieces} between 0 and ${t.pieces}`),
	],
)

/** A picture of one line, made smaller and stripped of where and with what it was taken. */
export const breakagePhotos = pgTable(
	"breakage_photos",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		lineId: uuid("line_id").notNull(),
		position: smallint("position").notNull().default(1),
		content: bytes("content").notNull(),
		mediaType: text("media_type").notNull(),
		width: integer("width").notNull(),
		height: integer("height").notNull(),
	},
	(t) => [
		primaryKey({ name: "breakage_photos_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "breakage_photos_line",
			columns: [t.producerId, t.lineId],
			foreignColumns: [breakageLines.producerId, breakageLines.id],
		}),
		unique("breakage_photos_position_once").on(t.producerId, t.lineId, t.position),
		check("breakage_photos_sane", sql`${t.width} > 0 and ${t.height} > 0 and length(${t.content}) <= 5242880`),
	],
)
