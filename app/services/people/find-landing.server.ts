import { findKeptPost } from "./find-kept-post.server"
import { findPlaces } from "./find-places.server"
import { safeTarget } from "./safe-target.server"

/**
 * Where to go after signing in: to what was typed before the session ended, if something waits; else where the person
 * wanted to go, if that is on this site; else to their only place, or to the front page that lists them.
 */
export async function findLanding(userId: string, request: Request, to: string | null): Promise<string> {
	const target = safeTarget(to)
	const kept = await findKeptPost(request, userId)
	if (kept && !kept.wasSent) return "/sign-in/go-on"
	if (target !== null) return target
	const [only, ...others] = await findPlaces(userId)
	return only && others.length === 0 ? only.href : "/"
}
