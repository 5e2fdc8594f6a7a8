import { and, eq, isNull, sql } from "drizzle-orm"
import { sessions } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"

/** Ends one session of the person. Another's, an unknown or an ended one is left as it is; answers whether one ended. */
export async function endSession(userId: string, sessionId: string): Promise<boolean> {
	const ended = await withPlatform((tx) =>
		tx
			.update(sessions)
			.set({ endedAt: sql`now()` })
			.where(and(eq(sessions.id, sessionId), eq(sessions.userId, userId), isNull(sessions.endedAt)))
			.returning({ id: sessions.id }),
	)
	return ended.length > 0
}
