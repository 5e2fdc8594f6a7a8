import type { Person } from "~/services/people/find-actor.server"
import type { StallViewer } from "~/services/stall/find-market-days.server"

/** Whose eyes the stall's services look through. */
export function viewerOf(scope: { person: Person; seesEveryDay: boolean }): StallViewer {
	return { personId: scope.person.id, seesEveryDay: scope.seesEveryDay }
}

/** An answer that tells nothing: no such day, or not one that this person is named on. */
export function notFound(): Response {
	return new Response(null, { status: 404 })
}
