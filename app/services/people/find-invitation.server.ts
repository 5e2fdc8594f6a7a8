import { and, eq, gt, isNull, sql } from "drizzle-orm"
import { invitations, producers, stores, users } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import type { ProducerRole, StoreRole } from "~/domain/people/roles"
import { hashToken } from "~/platform/session-cookie.server"
import { producerOfToken } from "./invitation-token.server"

export type OpenInvitation = {
	email: string
	role: ProducerRole | StoreRole
	producerName: string
	storeName: string | null
	invitedBy: string
}

/** The open invitation behind a mailed token, or null when it is accepted, withdrawn, expired or was never made. */
export async function findInvitation(token: string): Promise<OpenInvitation | null> {
	const producerId = producerOfToken(token)
	if (producerId === null) return null
	const [found] = await readProducer(producerId, (tx) =>
		tx
			.select({
				email: invitations.email,
				role: invitations.role,
				producerName: producers.name,
				storeName: stores.name,
				invitedBy: users.name,
			})
			.from(invitations)
			.innerJoin(producers, eq(producers.id, invitations.producerId))
			.innerJoin(users, eq(users.id, invitations.invitedBy))
			.leftJoin(stores, and(eq(stores.producerId, invitations.producerId), eq(stores.id, invitations.storeId)))
			.where(
				and(
					eq(invitations.producerId, producerId),
					eq(invitations.tokenHash, hashToken(token)),
					isNull(invitations.acceptedAt),
					gt(invitations.expiresAt, sql`now()`),
				),
			),
	)
	return found ?? null
}
