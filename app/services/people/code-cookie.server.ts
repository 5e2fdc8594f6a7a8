import { z } from "zod"
import { readCookie, writeCookie } from "~/platform/cookies.server"
import { seal, unseal } from "~/platform/secrets.server"
import { CODE_MINUTES } from "./sign-in-strategy.server"

const NAME = "code"

const ticket = z.object({ id: z.guid(), email: z.string() })

/** Which mailed code a browser waits for. Sealed: the tries of another's code cannot be used up by naming it. */
export type CodeTicket = z.infer<typeof ticket>

export function codeCookie(waitingFor: CodeTicket): string {
	return writeCookie(NAME, seal("sign-in-cookie", waitingFor), CODE_MINUTES * 60)
}

export function noCodeCookie(): string {
	return writeCookie(NAME, "", 0)
}

/** The ticket in the request's cookie, or null. */
export function readCodeTicket(request: Request): CodeTicket | null {
	const sealed = readCookie(request, NAME)
	return sealed === null ? null : (ticket.safeParse(unseal("sign-in-cookie", sealed)).data ?? null)
}
