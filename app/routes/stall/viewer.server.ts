import { z } from "zod"
import type { Person } from "~/services/people/find-actor.server"
import type { StallViewer } from "~/services/stall/find-market-days.server"

type StallScope = { person: Person; producer: { id: string }; seesEveryDay: boolean }

/** Whose eyes the stall's services look through. */
export function viewerOf(scope: StallScope): StallViewer {
	return { personId: scope.person.id, seesEveryDay: scope.seesEveryDay }
}

/** The market day that the address names, for who asks. Throws 404 where the address cannot name one. */
export function dayQuery(
	params: { day: string },
	scope: StallScope,
): { producerId: string; dayId: string; viewer: StallViewer } {
	return { producerId: scope.producer.id, dayId: idOf(params.day), viewer: viewerOf(scope) }
}

/** The id in an address, or 404: the database takes nothing else. */
export function idOf(text: string): string {
	if (!z.uuid().safeParse(text).success) throw notFound()
	return text
}

/** An answer that tells nothing: no such day, or not one that this person is named on. */
export function notFound(): Response {
	return new Response(null, { status: 404 })
}
