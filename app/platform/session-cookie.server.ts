import { createHash } from "node:crypto"
import { readCookie, writeCookie } from "./cookies.server"

const NAME = "session"

/** A session lasts this long from sign-in, however much it is used. */
export const SESSION_DAYS = 30

/** The token in the session cookie, or null. Whether it still opens anything, only the table `sessions` knows. */
export function readSessionToken(request: Request): string | null {
	return readCookie(request, NAME)
}

/** What the tables keep of a token: its SHA-256 as hex. A token has 256 random bits, so it needs no salt. */
export function hashToken(token: string): string {
	return createHash("sha256").update(token).digest("hex")
}

/** The Set-Cookie line that signs a browser in. */
export function sessionCookie(token: string): string {
	return writeCookie(NAME, token, SESSION_DAYS * 24 * 60 * 60)
}

/** The Set-Cookie line that forgets the session in this browser. */
export function noSessionCookie(): string {
	return writeCookie(NAME, "", 0)
}
