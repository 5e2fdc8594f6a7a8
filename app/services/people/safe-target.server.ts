import { env } from "~/platform/env.server"

/**
 * The path and query of `to` when it stays on this site, else null. It is resolved as a browser would resolve it and the
 * origins are compared: a test for "//" would let "/\host" through. Pages of signing in and out are no target.
 */
export function safeTarget(to: string | null): string | null {
	if (!to || !URL.canParse(to, env.BASE_URL)) return null
	const url = new URL(to, env.BASE_URL)
	if (url.origin !== env.BASE_URL || /^\/sign-(in|out)(\/|$)/.test(url.pathname)) return null
	return url.pathname + url.search
}
