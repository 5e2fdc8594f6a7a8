import { boolean, foreignKey, index, jsonb, pgTable, primaryKey, text, unique, uuid } from "drizzle-orm/pg-core"
import type { GradeScheme, GradingFacts } from "~/domain/grading/grade-comb"
import { day, id, instant, producerId } from "./columns"
import { lots } from "./lots"
import { users } from "./people"
import { producers } from "./producers"

/** A grade scheme as data: published schemes differ, and a producer may edit theirs. */
export const gradeSchemes = pgTable(
	"grade_schemes",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		name: text("name").notNull(),
		scheme: jsonb("scheme").$type<GradeScheme>().notNull(),
		isActive: boolean("is_active").notNull().default(true),
	},
	(t) => [
		primaryKey({ name: "grade_schemes_pk", columns: [t.producerId, t.id] }),
		unique("grade_schemes_name_once").on(t.producerId, t.name),
	],
)

/** A grading of a lot as it was done, with the scheme as it then stood; never altered. */
export const gradings = pgTable(
	"gradings",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		lotId: uuid("lot_id").notNull(),
		gradedOn: day("graded_on").notNull(),
		schemeName: text("scheme_name").notNull(),
		scheme: jsonb("scheme").$type<GradeScheme>().notNull(),
		facts: jsonb("facts").$type<GradingFacts>().notNull(),
		grade: text("grade").notNull(),
		/** Every reason that lowered the grade, as sentences. */
		reasons: jsonb("reasons").$type<string[]>().notNull(),
		gradedBy: uuid("graded_by").references(() => users.id),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "gradings_pk", columns: [t.producerId, t.id] }),
		foreignKey({ name: "gradings_lot", columns: [t.producerId, t.lotId], foreignColumns: [lots.producerId, lots.id] }),
		index("gradings_by_lot").on(t.producerId, t.lotId, t.createdAt, t.id),
	],
)
