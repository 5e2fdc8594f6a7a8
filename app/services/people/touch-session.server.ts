import { eq, sql } from "drizzle-orm"
import { sessions } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"

/** A session's "last seen" is good to this many minutes: fewer would make every page a write. */
export const SEEN_MINUTES = 10

/** Notes that a session is in use, for the list in which its person looks for strangers. */
export async function touchSession(sessionId: string): Promise<void> {
	await withPlatform((tx) => tx.update(sessions).set({ lastSeenAt: sql`now()` }).where(eq(sessions.id, sessionId)))
}
