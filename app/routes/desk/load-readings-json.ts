import { admits, guard } from "../guard.server"
import type { Route } from "./+types/load-readings-json"
import { takeLoggerFile } from "./load-file.server"

/** The form of a logger's file as its script posts it: the same as the page's own, answered as data. */
export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, params }: Route.ActionArgs, scope) => {
		const taken = await takeLoggerFile(request, scope, params.load)
		return taken.ok
			? Response.json({ href: taken.href })
			: Response.json({ errors: taken.errors }, { status: taken.status })
	},
)

/** There is nothing to read here; the page is beside it. */
export const loader = guard(admits.desk("owner", "desk", "packer"), () => new Response(null, { status: 405 }))
