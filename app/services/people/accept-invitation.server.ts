import { and, eq, gt, isNull, sql } from "drizzle-orm"
import { auditEntries, invitations, memberships } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { hashToken } from "~/platform/session-cookie.server"
import type { Person } from "./find-actor.server"
import { producerOfToken } from "./invitation-token.server"

/**
 * Gives the person the role they were invited to, once. The invitation must be for the address they are signed in with:
 * the link alone, forwarded or read by another, opens nothing. Answers whether it was open to them.
 */
export async function acceptInvitation(token: string, person: Person): Promise<boolean> {
	const producerId = producerOfToken(token)
	if (producerId === null) return false
	return withProducer(producerId, async (tx) => {
		const [accepted] = await tx
			.update(invitations)
			.set({ acceptedAt: sql`now()` })
			.where(
				and(
					eq(invitations.producerId, producerId),
					eq(invitations.tokenHash, hashToken(token)),
					eq(invitations.email, person.email),
					isNull(invitations.acceptedAt),
					gt(invitations.expiresAt, sql`now()`),
				),
			)
			.returning({ id: invitations.id, role: invitations.role, storeId: invitations.storeId })
		if (!accepted) return false
		const { id, role, storeId } = accepted
		await tx
			.insert(memberships)
			.values({ producerId, userId: person.id, role, storeId })
			// A role that was held before and ended begins again.
			.onConflictDoUpdate({
				target: [memberships.producerId, memberships.userId, memberships.role, memberships.storeId],
				set: { endedAt: null },
			})
		await tx.insert(auditEntries).values({
			producerId,
			userId: person.id,
			action: "invitation accepted",
			subjectType: "invitation",
			subjectId: id,
			detail: { role, storeId },
		})
		return true
	})
}
