import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CombForm, GradeScheme, GradingFacts } from "~/domain/grading/grade-comb"
import { type ListedScheme, readSchemes, schemesFor } from "./read-schemes.server"

export type ListedGrading = { id: string; gradedOn: Day; grade: string; schemeName: string; who: string | null }

/** The schemes that a lot can be graded by, the one used last first, and its gradings, the latest first. */
export function findGradingChoices(query: {
	producerId: string
	code: string
	form: CombForm
}): Promise<{ schemes: ListedScheme[]; gradings: ListedGrading[] }> {
	const { producerId, code, form } = query
	return readProducer(producerId, async (tx) => {
		const schemes = schemesFor(await readSchemes(tx, producerId), form)
		const { rows } = await tx.execute<ListedGrading>(sql`
			select g.id, g.graded_on::text as "gradedOn", g.grade, g.scheme_name as "schemeName", u.name as who
			from lots l
			join gradings g on g.producer_id = l.producer_id and g.lot_id = l.id
			left join users u on u.id = g.graded_by
			where l.producer_id = ${producerId} and l.code = ${code}
			order by g.created_at desc, g.id desc
			limit 20`)
		return { schemes, gradings: rows }
	})
}

/** A grading as it was done, with the lot it is about. */
export type FoundGrading = ListedGrading & {
	scheme: GradeScheme
	facts: GradingFacts
	reasons: string[]
	code: string
	productName: string
	detail: string
	harvestedOn: Day
	pieces: number
}

/** One grading of a lot, or null. */
export function findGrading(query: {
	producerId: string
	code: string
	gradingId: string
}): Promise<FoundGrading | null> {
	const { producerId, code, gradingId } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<FoundGrading>(sql`
			select g.id, g.graded_on::text as "gradedOn", g.grade, g.scheme_name as "schemeName", u.name as who, g.scheme,
				g.facts, g.reasons, l.code, p.name as "productName", p.detail, l.harvested_on::text as "harvestedOn",
				l.pieces_harvested as pieces
			from lots l
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			join gradings g on g.producer_id = l.producer_id and g.lot_id = l.id and g.id = ${gradingId}
			left join users u on u.id = g.graded_by
			where l.producer_id = ${producerId} and l.code = ${code}`)
		return rows[0] ?? null
	})
}
