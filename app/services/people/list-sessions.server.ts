import { and, desc, eq, gt, isNull, sql } from "drizzle-orm"
import { sessions } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"

export type OpenSession = { id: string; userAgent: string; createdAt: Date; expiresAt: Date }

/** The person's open sessions, the newest first. */
export function listSessions(userId: string): Promise<OpenSession[]> {
	return withPlatform((tx) =>
		tx
			.select({
				id: sessions.id,
				userAgent: sessions.userAgent,
				createdAt: sessions.createdAt,
				expiresAt: sessions.expiresAt,
			})
			.from(sessions)
			.where(and(eq(sessions.userId, userId), isNull(sessions.endedAt), gt(sessions.expiresAt, sql`now()`)))
			.orderBy(desc(sessions.createdAt), desc(sessions.id)),
	)
}
