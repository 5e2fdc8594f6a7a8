import { redirect } from "react-router"
import { noSessionCookie } from "~/platform/session-cookie.server"
import { endSession } from "~/services/people/end-session.server"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sign-out"
import { settingCookies } from "./cookie-headers.server"

/** Opening the address changes nothing; the button is on the account page. */
export const loader = guard(admits.anyone, () => redirect("/account"))

export const action = guard(admits.anyone, async (_args: Route.ActionArgs, { person }) => {
	if (person) await endSession(person.id, person.sessionId)
	return redirect("/sign-in", { headers: settingCookies([noSessionCookie()]) })
})
