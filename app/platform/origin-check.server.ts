import { env } from "./env.server"

/**
 * Whether a request was made by one of our own pages. Browsers name the origin with every post; it must be the public
 * address or the one the request itself came to. Where it is missing or hidden ("null"), the browser's own word on
 * whether both sides are the same decides (Sec-Fetch-Site, which no page can set). With neither, it is not ours.
 */
export function isSameOrigin(request: Request): boolean {
	const origin = request.headers.get("origin")
	if (origin === null || origin === "null") return request.headers.get("sec-fetch-site") === "same-origin"
	return origin === env.BASE_URL || origin === new URL(request.url).origin
}
