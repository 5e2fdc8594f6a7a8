import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { CombForm, GradeScheme } from "~/domain/grading/grade-comb"
import { schemeTemplates } from "~/domain/grading/templates"

/** A scheme to grade by; the id is empty for a template that the producer has not taken over. */
export type ListedScheme = { id: string; name: string; scheme: GradeScheme }

/** The schemes that the producer grades by, the one used last first. */
export async function readSchemes(tx: Tx, producerId: string): Promise<ListedScheme[]> {
	const { rows } = await tx.execute<ListedScheme>(sql`
		select s.id, s.name, s.scheme from grade_schemes s
		left join (
			select g.scheme_name, max(g.created_at) as at from gradings g where g.producer_id = ${producerId} group by 1
		) used on used.scheme_name = s.name
		where s.producer_id = ${producerId} and s.is_active
		order by used.at desc nulls last, s.name`)
	return rows
}

/** The producer's schemes for a form of comb; where there are none, the verified published ones. */
export function schemesFor(own: readonly ListedScheme[], form: CombForm): ListedScheme[] {
	const covering = own.filter(({ scheme }) => scheme.forms.includes(form))
	if (covering.length > 0) return covering
	return schemeTemplates
		.filter(({ isVerified, scheme }) => isVerified && scheme.forms.includes(form))
		.map(({ name, scheme }) => ({ id: "", name, scheme }))
}
