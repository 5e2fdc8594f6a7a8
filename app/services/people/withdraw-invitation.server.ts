import { and, eq, gt, isNull, sql } from "drizzle-orm"
import { auditEntries, invitations } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"

/** Takes an open invitation back: its link opens nothing any more. Answers whether there was one. */
export async function withdrawInvitation(producerId: string, actorId: string, invitationId: string): Promise<boolean> {
	return withProducer(producerId, async (tx) => {
		const [withdrawn] = await tx
			.update(invitations)
			.set({ expiresAt: sql`now()` })
			.where(
				and(
					eq(invitations.producerId, producerId),
					eq(invitations.id, invitationId),
					isNull(invitations.acceptedAt),
					gt(invitations.expiresAt, sql`now()`),
				),
			)
			.returning({ email: invitations.email, role: invitations.role })
		if (!withdrawn) return false
		await tx.insert(auditEntries).values({
			producerId,
			userId: actorId,
			action: "invitation withdrawn",
			subjectType: "invitation",
			subjectId: invitationId,
			detail: withdrawn,
		})
		return true
	})
}
