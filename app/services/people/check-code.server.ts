import { and, eq, gt, isNull, lt, sql } from "drizzle-orm"
import { loginCodes } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { takeFrom } from "~/platform/rate-limit.server"
import { isSameHash } from "~/platform/secrets.server"
import { type CodeTicket, noCodeCookie } from "./code-cookie.server"
import { codeHash } from "./request-code.server"
import { TRIES_PER_NETWORK } from "./sign-in-limits.server"
import { checkWithStrategy } from "./sign-in-strategy.server"
import { type SignedIn, startSession } from "./start-session.server"

const MOST_TRIES = 5

export type CodeRefusal =
	| { ok: false; reason: "too-many"; retryAfterSeconds: number }
	/** Expired, used, or tried too often: a new one is needed. */
	| { ok: false; reason: "spent" }
	| { ok: false; reason: "wrong"; triesLeft: number }

/**
 * Signs the browser in when `code` (six digits) is the one it waits for. The table has the word: the try is counted
 * before anything is compared, the code counts for the row's own address only, and one conditional update spends it.
 * The strategy must agree as well. Answers the person and all cookies to set.
 */
export async function checkCode(
	ticket: CodeTicket,
	code: string,
	request: Request,
	network: string,
): Promise<Result<{ userId: string; cookies: string[] }, CodeRefusal>> {
	const taken = await takeFrom([TRIES_PER_NETWORK, network])
	if (!taken.ok) return taken
	const row = await countTry(ticket.id)
	if (!row) return { ok: false, reason: "spent" }
	const wrong = refusedWith(MOST_TRIES - row.attempts)
	if (!isSameHash(row.codeHash, codeHash(ticket.id, row.email, code))) return wrong

	let signedIn: SignedIn | null = null
	const strategyCookie = await checkWithStrategy(code, request, async (email) => {
		if (email !== row.email) return false
		signedIn = await spend(ticket.id, request)
		return signedIn !== null
	})
	// Assigned inside the callback, which the compiler does not follow.
	const started = signedIn as SignedIn | null
	if (strategyCookie === null || started === null) return wrong
	return { ok: true, userId: started.userId, cookies: [strategyCookie, noCodeCookie(), started.cookie] }
}

function refusedWith(triesLeft: number): CodeRefusal {
	return triesLeft > 0 ? { ok: false, reason: "wrong", triesLeft } : { ok: false, reason: "spent" }
}

/** Counts one try and answers the row, or null when no further try is allowed. Atomic: ten at once get five. */
async function countTry(id: string) {
	const [row] = await withPlatform((tx) =>
		tx
			.update(loginCodes)
			.set({ attempts: sql`${loginCodes.attempts} + 1` })
			.where(and(eq(loginCodes.id, id), lt(loginCodes.attempts, MOST_TRIES), isLive))
			.returning({ email: loginCodes.email, codeHash: loginCodes.codeHash, attempts: loginCodes.attempts }),
	)
	return row ?? null
}

/** Uses the code up and starts the session, both or neither; null when it was used up before. */
function spend(id: string, request: Request): Promise<SignedIn | null> {
	return withPlatform(async (tx) => {
		const [spent] = await tx
			.update(loginCodes)
			.set({ usedAt: sql`now()` })
			.where(and(eq(loginCodes.id, id), isLive))
			.returning({ email: loginCodes.email })
		return spent ? startSession(tx, spent.email, request) : null
	})
}

const isLive = and(isNull(loginCodes.usedAt), gt(loginCodes.expiresAt, sql`now()`))
