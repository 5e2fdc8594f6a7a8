import { eq, lt, sql } from "drizzle-orm"
import { keptPosts, sessions } from "~/db/schema"
import { withPlatform } from "~/db/transaction.server"
import { clientNetwork } from "~/platform/client-network.server"
import { takeFrom } from "~/platform/rate-limit.server"
import { hashToken, readSessionToken } from "~/platform/session-cookie.server"
import { keptPostCookie } from "./kept-post-cookie.server"
import { KEPT_PER_NETWORK } from "./sign-in-limits.server"

/** Larger posts are not kept: an order sheet of two hundred lines is a tenth of this. */
const MOST_BYTES = 128 * 1024
const FORM_TYPES = ["application/x-www-form-urlencoded", "multipart/form-data"]

/**
 * Keeps what was posted without a session for an hour, and answers the redirect to /sign-in with a cookie that finds it
 * again. Files are left out. A post that is too large, of unknown length, no form, or one too many from its network is not
 * kept; the person is sent to sign in all the same. What was posted is bound to whoever's session the browser last held, where that is known, so
 * that the next person at a shared desk is not shown it.
 */
export async function keepPost(request: Request): Promise<Response> {
	const address = pageAddress(request.url)
	const postTo = address.pathname + address.search
	address.searchParams.delete("index")
	// A post of the sign-in pages themselves, as "Send it now" is, must not take the place of what it was about.
	const fields = postTo.startsWith("/sign-in") ? null : await readFields(request)
	const headers = new Headers({
		location: `/sign-in?${new URLSearchParams({ to: address.pathname + address.search })}`,
		"cache-control": "no-store",
	})
	if (fields !== null && (await takeFrom([KEPT_PER_NETWORK, clientNetwork(request)])).ok) {
		const kept = await store(postTo, fields, readSessionToken(request))
		headers.append("set-cookie", keptPostCookie(kept))
	}
	return new Response(null, { status: 303, headers })
}

async function store(path: string, fields: [string, string][], token: string | null) {
	return withPlatform(async (tx) => {
		await tx.delete(keptPosts).where(lt(keptPosts.expiresAt, sql`now()`))
		const [row] = await tx
			.insert(keptPosts)
			.values({ path, fields, expiresAt: sql`now() + interval '1 hour'` })
			.returning({ id: keptPosts.id })
		if (!row) throw new Error("a kept post was not written")
		const [session] = token
			? await tx
					.select({ userId: sessions.userId })
					.from(sessions)
					.where(eq(sessions.tokenHash, hashToken(token)))
			: []
		return { id: row.id, userId: session?.userId ?? null, wasSent: false }
	})
}

/** The text fields in their order, or null when the body is not one to keep. */
async function readFields(request: Request): Promise<[string, string][] | null> {
	const type = request.headers.get("content-type")?.split(";", 1)[0]?.trim().toLowerCase() ?? ""
	const length = Number(request.headers.get("content-length") ?? Number.NaN)
	if (request.method !== "POST" || !FORM_TYPES.includes(type) || !(length > 0 && length <= MOST_BYTES)) return null
	const form = await request.formData().catch(() => null)
	// PostgreSQL's json has no NUL character; no form field has a use for one.
	return form && [...form].flatMap(([name, value]) => (typeof value === "string" ? [[clean(name), clean(value)]] : []))
}

const clean = (text: string) => text.replaceAll("\u0000", "")

/** The address that was posted to, without the `.data` and `_routes` that a client navigation adds to it. */
function pageAddress(url: string): URL {
	const address = new URL(url)
	address.pathname = address.pathname.replace(/\/_\.data$/, "/").replace(/\.data$/, "")
	address.searchParams.delete("_routes")
	return address
}
