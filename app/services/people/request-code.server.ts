import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { loginCodes } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import { type Taken, takeFrom } from "~/platform/rate-limit.server"
import { hmac, randomToken, seal } from "~/platform/secrets.server"
import { hashToken } from "~/platform/session-cookie.server"
import { codeCookie } from "./code-cookie.server"
import type { SignInMail } from "./send-sign-in-mail.server"
import { CODES_PER_ADDRESS, CODES_PER_ADDRESS_AND_DAY, CODES_PER_NETWORK } from "./sign-in-limits.server"
import { CODE_MINUTES, makeCode } from "./sign-in-strategy.server"

/**
 * Has a code mailed to `email` (lower case), or a letter that says the address is not known here: which, only the worker
 * finds out, so that this takes the same way and time for every address. `to` is where the person wanted to go, and
 * travels with the link. Answers the cookies that tie the code to the browser; refuses when the address or the network
 * has had too many.
 */
export async function requestCode(asked: {
	email: string
	network: string
	to: string | null
}): Promise<Exclude<Taken, { ok: true }> | { ok: true; cookies: string[] }> {
	const { email, network, to } = asked
	const taken = await takeFrom(
		[CODES_PER_NETWORK, network],
		[CODES_PER_ADDRESS, email],
		[CODES_PER_ADDRESS_AND_DAY, email],
	)
	if (!taken.ok) return taken
	const id = randomUUID()
	const strategyCookie = await makeCode(email, (code) => writeCode({ id, email, code, to }))
	return { ok: true, cookies: [strategyCookie, codeCookie({ id, email })] }
}

/** Writes down the hashes of the code and link, and hands the mail to the worker, in one transaction. */
async function writeCode(made: { id: string; email: string; code: string; to: string | null }): Promise<void> {
	const { id, email, code, to } = made
	const linkToken = randomToken()
	await withPlatform(async (tx) => {
		const [row] = await tx
			.insert(loginCodes)
			.values({
				id,
				email,
				codeHash: codeHash(id, email, code),
				linkHash: hashToken(linkToken),
				expiresAt: sql`now() + ${CODE_MINUTES} * interval '1 minute'`,
			})
			.returning({ expiresAt: loginCodes.expiresAt })
		if (!row) throw new Error("a sign-in code was not written")
		const mail: SignInMail = { id, email, code, link: linkTo(linkToken, to), expiresAt: row.expiresAt.toISOString() }
		const payload = JSON.stringify({ sealed: seal("sign-in-mail", mail) })
		await tx.execute(sql`select jobs.enqueue('send-sign-in-mail', ${payload}::json)`)
	})
}

/** What the table keeps of a code: bound to its row and address, so that it is worth nothing beside another's. */
export function codeHash(id: string, email: string, code: string): string {
	return hmac("sign-in-code", id, email, code)
}

function linkTo(token: string, to: string | null): string {
	const link = new URL(`/sign-in/link/${token}`, env.BASE_URL)
	if (to !== null) link.searchParams.set("to", to)
	return link.href
}
