import { and, eq } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { gradeSchemes } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import type { GradeScheme } from "~/domain/grading/grade-comb"
import type { Result } from "~/domain/result"
import { type ListedScheme, readSchemes } from "./read-schemes.server"

/** The schemes that the producer grades by, the one used last first. */
export function listSchemes(producerId: string): Promise<ListedScheme[]> {
	return readProducer(producerId, (tx) => readSchemes(tx, producerId))
}

/**
 * Keeps a scheme, new or changed; gradings made with it stay as they were done. Refuses a name that another scheme has,
 * also one that was put away, and a scheme that is not there.
 */
export async function saveScheme(query: {
	producerId: string
	id: string
	isNew: boolean
	name: string
	scheme: GradeScheme
}): Promise<Result<object, { ok: false; reason: "name-taken" | "no-such-scheme" }>> {
	const { producerId, id, isNew, name, scheme } = query
	try {
		return await withProducer(producerId, async (tx) => {
			if (isNew) {
				await tx.insert(gradeSchemes).values({ producerId, id, name, scheme })
				return { ok: true } as const
			}
			const changed = await tx
				.update(gradeSchemes)
				.set({ name, scheme })
				.where(and(eq(gradeSchemes.producerId, producerId), eq(gradeSchemes.id, id)))
				.returning({ id: gradeSchemes.id })
			return changed.length > 0 ? ({ ok: true } as const) : ({ ok: false, reason: "no-such-scheme" } as const)
		})
	} catch (error) {
		if (breaksConstraint(error, "grade_schemes_pk")) return { ok: true }
		if (breaksConstraint(error, "grade_schemes_name_once")) return { ok: false, reason: "name-taken" }
		throw error
	}
}

/** Puts a scheme away: nothing new is graded by it, and what was stays. */
export function putSchemeAway(query: { producerId: string; id: string }): Promise<void> {
	return withProducer(query.producerId, async (tx) => {
		await tx
			.update(gradeSchemes)
			.set({ isActive: false })
			.where(and(eq(gradeSchemes.producerId, query.producerId), eq(gradeSchemes.id, query.id)))
	})
}
