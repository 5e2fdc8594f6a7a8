import { eq } from "drizzle-orm"
import { keptPosts } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"

/** Throws away what was kept, at the wish of the person whose it is. */
export async function dropKeptPost(id: string): Promise<void> {
	await withPlatform((tx) => tx.delete(keptPosts).where(eq(keptPosts.id, id)))
}
