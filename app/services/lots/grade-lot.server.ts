import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { gradings } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type GradeScheme, type GradingFacts, gradeComb } from "~/domain/grading/grade-comb"
import type { Result } from "~/domain/result"

export type GradeLot = {
	producerId: string
	personId: string
	code: string
	/** Made with the form: a second send finds the first grading. */
	gradingId: string
	gradedOn: Day
	schemeName: string
	scheme: GradeScheme
	facts: GradingFacts
}

/**
 * Grades a lot and keeps the grading for ever, with the scheme as it stands now; the lot carries the grade from then on,
 * and the Pfund reading where one was made. Sending the same form again changes nothing. Refuses a withdrawn lot.
 */
export async function gradeLot(
	query: GradeLot,
): Promise<Result<{ gradingId: string }, { ok: false; reason: "no-such-lot" | "withdrawn" }>> {
	const { producerId, personId, code, gradingId, gradedOn, schemeName, scheme, facts } = query
	try {
		return await withProducer(producerId, async (tx) => {
			const { rows } = await tx.execute<{ id: string; state: string }>(sql`
				select id, state from lots where producer_id = ${producerId} and code = ${code} for no key update`)
			const [lot] = rows
			if (!lot) return { ok: false, reason: "no-such-lot" } as const
			if (lot.state === "withdrawn") return { ok: false, reason: "withdrawn" } as const
			const { grade, reasons } = gradeComb(scheme, facts)
			await tx.insert(gradings).values({
				producerId,
				id: gradingId,
				lotId: lot.id,
				gradedOn,
				schemeName,
				scheme,
				facts,
				grade,
				reasons,
				gradedBy: personId,
			})
			await tx.execute(sql`
				update lots set grade = ${grade}, pfund_tenths = coalesce(${facts.pfundTenths}::smallint, pfund_tenths)
				where producer_id = ${producerId} and id = ${lot.id}`)
			return { ok: true, gradingId } as const
		})
	} catch (error) {
		if (breaksConstraint(error, "gradings_pk")) return { ok: true, gradingId }
		throw error
	}
}
