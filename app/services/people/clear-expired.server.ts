import { lt, sql } from "drizzle-orm"
import { keptPosts, loginCodes, rateLimits, sessions } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"

/** Deletes what opens and shows nothing any more: sessions, codes and kept posts past their time, counters run out. */
export async function clearExpired(): Promise<void> {
	await withPlatform(async (tx) => {
		await tx.delete(sessions).where(lt(sessions.expiresAt, sql`now()`))
		await tx.delete(loginCodes).where(lt(loginCodes.expiresAt, sql`now() - interval '1 day'`))
		await tx.delete(keptPosts).where(lt(keptPosts.expiresAt, sql`now()`))
		await tx.delete(rateLimits).where(lt(rateLimits.expire, sql`extract(epoch from now()) * 1000`))
	})
}
