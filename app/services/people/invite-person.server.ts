import { and, eq, gt, isNull, sql } from "drizzle-orm"
import { auditEntries, invitations, memberships, stores, users } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import type { ProducerRole, StoreRole } from "~/domain/people/roles"
import type { Result } from "~/domain/result"
import { env } from "~/platform/env.server"
import { takeFrom } from "~/platform/rate-limit.server"
import { hashToken } from "~/platform/session-cookie.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { Person, Producer } from "./find-actor.server"
import { makeInvitationToken } from "./invitation-token.server"
import { INVITATIONS_PER_ADDRESS, INVITATIONS_PER_PRODUCER } from "./sign-in-limits.server"

const DAYS_GOOD = 14

export type Invited = { email: string; name: string } & (
	| { role: ProducerRole; storeId: null }
	| { role: StoreRole; storeId: string }
)

export type InviteRefusal =
	| { ok: false; reason: "too-many"; retryAfterSeconds: number }
	| { ok: false; reason: "no-such-store" }
	| { ok: false; reason: "has-role-already" }

/**
 * Invites an address (lower case) to one role; the letter goes through the outbox in the same transaction. An earlier
 * open invitation to the same role is replaced. The person can sign in from now on, and has the role once they accept.
 */
export async function invitePerson(
	producer: Producer,
	inviter: Person,
	invited: Invited,
): Promise<Result<object, InviteRefusal>> {
	const taken = await takeFrom(
		[INVITATIONS_PER_PRODUCER, producer.id],
		[INVITATIONS_PER_ADDRESS, `${producer.id} ${invited.email}`],
	)
	if (!taken.ok) return taken
	return withProducer<Result<object, InviteRefusal>>(producer.id, async (tx) => {
		const storeName = invited.storeId === null ? null : await findStoreName(tx, producer.id, invited.storeId)
		if (invited.storeId !== null && storeName === null) return { ok: false, reason: "no-such-store" }
		const { email, name } = invited
		await tx.insert(users).values({ email, name }).onConflictDoNothing({ target: users.email })
		if (await hasRole(tx, producer.id, invited)) return { ok: false, reason: "has-role-already" }
		await closeEarlier(tx, producer.id, invited)
		await write(tx, producer, inviter, invited, storeName)
		return { ok: true }
	})
}

async function write(tx: Tx, producer: Producer, inviter: Person, invited: Invited, storeName: string | null) {
	const token = makeInvitationToken(producer.id)
	const [row] = await tx
		.insert(invitations)
		.values({
			producerId: producer.id,
			...invited,
			tokenHash: hashToken(token),
			invitedBy: inviter.id,
			expiresAt: sql`now() + ${DAYS_GOOD} * interval '1 day'`,
		})
		.returning({ id: invitations.id, expiresAt: invitations.expiresAt })
	if (!row) throw new Error("an invitation was not written")
	await queueMail(tx, {
		producerId: producer.id,
		to: invited.email,
		template: "invitation",
		props: {
			yard: letterHead(await findYard(tx, producer.id)),
			sentTo: invited.email,
			role: invited.role,
			storeName,
			invitedBy: inviter.name,
			link: `${env.BASE_URL}/invitation/${token}`,
			expiresOn: dayInZone(row.expiresAt, producer.timeZone),
		},
		onceKey: `invitation ${row.id}`,
	})
	await tx.insert(auditEntries).values({
		producerId: producer.id,
		userId: inviter.id,
		action: "person invited",
		subjectType: "invitation",
		subjectId: row.id,
		detail: { email: invited.email, role: invited.role, storeId: invited.storeId },
	})
}

async function findStoreName(tx: Tx, producerId: string, storeId: string): Promise<string | null> {
	const [store] = await tx
		.select({ name: stores.name })
		.from(stores)
		.where(and(eq(stores.producerId, producerId), eq(stores.id, storeId)))
	return store?.name ?? null
}

async function hasRole(tx: Tx, producerId: string, { email, role, storeId }: Invited): Promise<boolean> {
	const held = await tx
		.select({ id: memberships.id })
		.from(memberships)
		.innerJoin(users, eq(users.id, memberships.userId))
		.where(
			and(
				eq(memberships.producerId, producerId),
				eq(users.email, email),
				eq(memberships.role, role),
				storeId === null ? isNull(memberships.storeId) : eq(memberships.storeId, storeId),
				isNull(memberships.endedAt),
			),
		)
	return held.length > 0
}

async function closeEarlier(tx: Tx, producerId: string, { email, role, storeId }: Invited): Promise<void> {
	await tx
		.update(invitations)
		.set({ expiresAt: sql`now()` })
		.where(
			and(
				eq(invitations.producerId, producerId),
				eq(invitations.email, email),
				eq(invitations.role, role),
				storeId === null ? isNull(invitations.storeId) : eq(invitations.storeId, storeId),
				isNull(invitations.acceptedAt),
				gt(invitations.expiresAt, sql`now()`),
			),
		)
}
