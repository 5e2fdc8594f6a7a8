import { admits, guard } from "../guard.server"
import type { Route } from "./+types/check"
import { postedForm, takeCheck } from "./check-post.server"

const NOT_KEPT = { headers: { "Cache-Control": "private, no-store" } }

/** Under which account a phone would send now, asked before it sends what it has kept. */
export const loader = guard(admits.desk("owner", "desk", "packer"), (_args: Route.LoaderArgs, { person }) =>
	Response.json({ personId: person.id }, NOT_KEPT),
)

/** Takes one check that a phone has kept, as the pages' own forms do. */
export const action = guard(admits.desk("owner", "desk", "packer"), async ({ request }: Route.ActionArgs, scope) => {
	const taken = await takeCheck(await postedForm(request), scope)
	if (taken.ok) return Response.json({ ok: true }, NOT_KEPT)
	return Response.json({ errors: taken.errors, newId: taken.newId }, { ...NOT_KEPT, status: 422 })
})
