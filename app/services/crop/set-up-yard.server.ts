import { and, eq } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, yards } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"

type SetUpYardRefusal = { ok: false; reason: "name-taken" | "not-found" }

/** Enters a yard, or changes the words of the one that `yardId` names. Two yards cannot have one name. */
export async function setUpYard(given: {
	producerId: string
	personId: string
	yardId: string | null
	name: string
	flora: string
}): Promise<Result<{ yardId: string }, SetUpYardRefusal>> {
	const { producerId, personId, yardId, name, flora } = given
	try {
		return await withProducer(producerId, async (tx) => {
			const [yard] =
				yardId === null
					? await tx.insert(yards).values({ producerId, name, flora }).returning({ id: yards.id })
					: await tx
							.update(yards)
							.set({ name, flora })
							.where(and(eq(yards.producerId, producerId), eq(yards.id, yardId)))
							.returning({ id: yards.id })
			if (!yard) return { ok: false, reason: "not-found" }
			await tx.insert(auditEntries).values({
				producerId,
				userId: personId,
				action: yardId === null ? "yard entered" : "yard changed",
				subjectType: "yard",
				subjectId: yard.id,
				detail: { name, flora },
			})
			return { ok: true, yardId: yard.id }
		})
	} catch (error) {
		if (breaksConstraint(error, "yards_name_once")) return { ok: false, reason: "name-taken" }
		throw error
	}
}
