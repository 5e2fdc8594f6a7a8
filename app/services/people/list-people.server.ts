import { and, asc, eq, gt, isNull, sql } from "drizzle-orm"
import { invitations, memberships, stores, users } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { ProducerRole, StoreRole } from "~/domain/people/roles"

type Role = ProducerRole | StoreRole
export type Member = { membershipId: string; name: string; email: string; role: Role; storeName: string | null }
export type Waiting = {
	invitationId: string
	name: string
	email: string
	role: Role
	storeName: string | null
	expiresAt: Date
}
export type PeopleOfProducer = { members: Member[]; waiting: Waiting[]; stores: { id: string; name: string }[] }

/** Who has a role at the producer or one of its stores, who is invited, and the stores one may be invited to; by name. */
export function listPeople(producerId: string): Promise<PeopleOfProducer> {
	return readProducer(producerId, async (tx) => ({
		members: await listMembers(tx, producerId),
		waiting: await listWaiting(tx, producerId),
		stores: await tx
			.select({ id: stores.id, name: stores.name })
			.from(stores)
			.where(and(eq(stores.producerId, producerId), eq(stores.isActive, true)))
			.orderBy(asc(stores.name), asc(stores.id)),
	}))
}

function listMembers(tx: Tx, producerId: string): Promise<Member[]> {
	return tx
		.select({
			membershipId: memberships.id,
			name: users.name,
			email: users.email,
			role: memberships.role,
			storeName: stores.name,
		})
		.from(memberships)
		.innerJoin(users, eq(users.id, memberships.userId))
		.leftJoin(stores, and(eq(stores.producerId, memberships.producerId), eq(stores.id, memberships.storeId)))
		.where(and(eq(memberships.producerId, producerId), isNull(memberships.endedAt)))
		.orderBy(asc(users.name), asc(users.email), asc(memberships.role), asc(memberships.id))
}

function listWaiting(tx: Tx, producerId: string): Promise<Waiting[]> {
	return tx
		.select({
			invitationId: invitations.id,
			name: invitations.name,
			email: invitations.email,
			role: invitations.role,
			storeName: stores.name,
			expiresAt: invitations.expiresAt,
		})
		.from(invitations)
		.leftJoin(stores, and(eq(stores.producerId, invitations.producerId), eq(stores.id, invitations.storeId)))
		.where(
			and(
				eq(invitations.producerId, producerId),
				isNull(invitations.acceptedAt),
				gt(invitations.expiresAt, sql`now()`),
			),
		)
		.orderBy(asc(invitations.name), asc(invitations.email), asc(invitations.id))
}
