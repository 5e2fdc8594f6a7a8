import { Cookie, SetCookie } from "@mjackson/headers"
import { env } from "./env.server"

/** Whether people reach the product over TLS; then its cookies are sent over nothing else. */
export function isOverTls(): boolean {
	return env.BASE_URL.startsWith("https:")
}

/**
 * The name of a cookie of ours. Over TLS the prefix makes the browser refuse one that was set for a wider domain, so
 * that a neighbouring host cannot plant it.
 */
function cookieName(name: string): string {
	return isOverTls() ? `__Host-waxbill-${name}` : `waxbill-${name}`
}

/** The value of our cookie `name` (without prefix), or null when the request carries none. */
export function readCookie(request: Request, name: string): string | null {
	return new Cookie(request.headers.get("cookie") ?? "").get(cookieName(name)) || null
}

/** A Set-Cookie line that no script can read and no foreign page can send with a post. `seconds` 0 removes it. */
export function writeCookie(name: string, value: string, seconds: number): string {
	return new SetCookie({
		name: cookieName(name),
		value,
		path: "/",
		httpOnly: true,
		sameSite: "Lax",
		...(isOverTls() && { secure: true }),
		// A Max-Age of 0 is left out by the package, so that a removal needs a date in the past.
		...(seconds > 0 ? { maxAge: seconds } : { expires: new Date(0) }),
	}).toString()
}
