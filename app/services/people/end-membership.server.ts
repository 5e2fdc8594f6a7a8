import { and, asc, eq, isNull, or, sql } from "drizzle-orm"
import { auditEntries, memberships } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"

/**
 * Ends one role of one person at the producer. The last owner stays: all owners' rows are locked first, so that two who
 * end one another at the same moment do not leave the desk to nobody. A role of another producer is not found.
 */
export async function endMembership(
	producerId: string,
	actorId: string,
	membershipId: string,
): Promise<Result<object, { ok: false; reason: "not-found" | "last-owner" }>> {
	return withProducer(producerId, async (tx) => {
		const locked = await tx
			.select({ id: memberships.id, userId: memberships.userId, role: memberships.role, storeId: memberships.storeId })
			.from(memberships)
			.where(
				and(
					eq(memberships.producerId, producerId),
					or(eq(memberships.id, membershipId), eq(memberships.role, "owner")),
					isNull(memberships.endedAt),
				),
			)
			.orderBy(asc(memberships.id))
			.for("update")
		const ending = locked.find(({ id }) => id === membershipId)
		if (!ending) return { ok: false, reason: "not-found" }
		const owners = locked.filter(({ role }) => role === "owner")
		if (ending.role === "owner" && owners.length === 1) return { ok: false, reason: "last-owner" }
		await tx
			.update(memberships)
			.set({ endedAt: sql`now()` })
			.where(and(eq(memberships.producerId, producerId), eq(memberships.id, membershipId)))
		await tx.insert(auditEntries).values({
			producerId,
			userId: actorId,
			action: "role ended",
			subjectType: "membership",
			subjectId: membershipId,
			detail: { userId: ending.userId, role: ending.role, storeId: ending.storeId },
		})
		return { ok: true }
	})
}
