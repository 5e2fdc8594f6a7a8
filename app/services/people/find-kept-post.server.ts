import { and, eq, gt, sql } from "drizzle-orm"
import { keptPosts } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { readKeptPostTicket } from "./kept-post-cookie.server"

export type KeptPost = { id: string; path: string; fields: [string, string][]; wasSent: boolean }

/**
 * What this browser had posted without a session, if it is not older than an hour and was not typed under the session
 * of somebody other than `userId`.
 */
export async function findKeptPost(request: Request, userId: string): Promise<KeptPost | null> {
	const ticket = readKeptPostTicket(request)
	if (!ticket || (ticket.userId !== null && ticket.userId !== userId)) return null
	const [row] = await withPlatform((tx) =>
		tx
			.select({ id: keptPosts.id, path: keptPosts.path, fields: keptPosts.fields })
			.from(keptPosts)
			.where(and(eq(keptPosts.id, ticket.id), gt(keptPosts.expiresAt, sql`now()`))),
	)
	return row ? { ...row, wasSent: ticket.wasSent } : null
}
