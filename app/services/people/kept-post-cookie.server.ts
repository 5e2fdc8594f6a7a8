import { z } from "zod"
import { readCookie, writeCookie } from "~/platform/cookies.server"
import { seal, unseal } from "~/platform/secrets.server"

const NAME = "kept"
const HOUR = 60 * 60

const ticket = z.object({ id: z.guid(), userId: z.guid().nullable(), wasSent: z.boolean() })

/**
 * What finds a kept post again. `userId` is whose session the browser held when it was posted, where known; `wasSent`
 * says that it was sent since, so that it is not offered by itself again, though it can still be looked at.
 */
export type KeptPostTicket = z.infer<typeof ticket>

/** The Set-Cookie line for a kept post. Sealed, so that nobody can make one out for another's. */
export function keptPostCookie(kept: KeptPostTicket): string {
	return writeCookie(NAME, seal("kept-post", kept), HOUR)
}

/** The Set-Cookie line that forgets the kept post in this browser. */
export function noKeptPostCookie(): string {
	return writeCookie(NAME, "", 0)
}

/** The ticket in the request's cookie, or null. */
export function readKeptPostTicket(request: Request): KeptPostTicket | null {
	const sealed = readCookie(request, NAME)
	return sealed === null ? null : (ticket.safeParse(unseal("kept-post", sealed)).data ?? null)
}
