import { and, eq, gt, isNull, sql } from "drizzle-orm"
import { loginCodes } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { takeFrom } from "~/platform/rate-limit.server"
import { hashToken } from "~/platform/session-cookie.server"
import { noCodeCookie } from "./code-cookie.server"
import { TRIES_PER_NETWORK } from "./sign-in-limits.server"
import { startSession } from "./start-session.server"

/** The address that a mailed link signs in, or null when the link is used, expired or was never made. Spends nothing. */
export async function findLink(token: string): Promise<string | null> {
	const [row] = await withPlatform((tx) =>
		tx.select({ email: loginCodes.email }).from(loginCodes).where(isLiveLink(token)),
	)
	return row?.email ?? null
}

/**
 * Signs the browser in by a mailed link, once, from whichever browser it is opened in: 256 random bits need no second
 * half in a cookie. The code of the same mail is used up with it. Answers null when the link is no longer good or the
 * network has tried too often.
 */
export async function signInByLink(
	token: string,
	request: Request,
	network: string,
): Promise<{ userId: string; cookies: string[] } | null> {
	const taken = await takeFrom([TRIES_PER_NETWORK, network])
	if (!taken.ok) return null
	const signedIn = await withPlatform(async (tx) => {
		const [spent] = await tx
			.update(loginCodes)
			.set({ usedAt: sql`now()` })
			.where(isLiveLink(token))
			.returning({ email: loginCodes.email })
		return spent ? startSession(tx, spent.email, request) : null
	})
	return signedIn && { userId: signedIn.userId, cookies: [noCodeCookie(), signedIn.cookie] }
}

function isLiveLink(token: string) {
	return and(eq(loginCodes.linkHash, hashToken(token)), isNull(loginCodes.usedAt), gt(loginCodes.expiresAt, sql`now()`))
}
