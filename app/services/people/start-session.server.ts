import { and, eq, isNull, sql } from "drizzle-orm"
import { sessions, users } from "~/db/schema"
import type { PlatformTx } from "~/db/transaction.server"
import { randomToken } from "~/platform/secrets.server"
import { hashToken, readSessionToken, SESSION_DAYS, sessionCookie } from "~/platform/session-cookie.server"

/** A person who has just signed in, and the Set-Cookie line of their new session. */
export type SignedIn = { userId: string; cookie: string }

/**
 * Starts a session for the person with this address, always under a new token; the one the browser held before is ended.
 * Answers null when nobody has the address.
 */
export async function startSession(tx: PlatformTx, email: string, request: Request): Promise<SignedIn | null> {
	const [user] = await tx.select({ id: users.id }).from(users).where(eq(users.email, email))
	if (!user) return null
	const before = readSessionToken(request)
	if (before !== null) {
		await tx
			.update(sessions)
			.set({ endedAt: sql`now()` })
			.where(and(eq(sessions.tokenHash, hashToken(before)), isNull(sessions.endedAt)))
	}
	const token = randomToken()
	await tx.insert(sessions).values({
		userId: user.id,
		tokenHash: hashToken(token),
		userAgent: (request.headers.get("user-agent") ?? "").slice(0, 300),
		expiresAt: sql`now() + ${SESSION_DAYS} * interval '1 day'`,
	})
	return { userId: user.id, cookie: sessionCookie(token) }
}
