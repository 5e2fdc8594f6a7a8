import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords, timeWords } from "~/domain/calendar"
import { noSessionCookie } from "~/platform/session-cookie.server"
import { endSession } from "~/services/people/end-session.server"
import { findPlaces } from "~/services/people/find-places.server"
import { listSessions } from "~/services/people/list-sessions.server"
import { Button } from "~/ui/forms/button"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sessions"
import { browserWords } from "./browser-words"
import { settingCookies } from "./cookie-headers.server"

export const meta: Route.MetaFunction = () => [{ title: "Where you are signed in · Waxbill" }]

export const loader = guard(admits.signedIn, async (_args: Route.LoaderArgs, { person }) => {
	// Times are told where the person works or buys.
	const zone = (await findPlaces(person.id))[0]?.timeZone ?? "UTC"
	const words = (at: Date) => `${dayWords(dayInZone(at, zone))}, ${timeWords(at, zone)}`
	const open = await listSessions(person.id)
	return {
		zone,
		sessions: open.map(({ id, userAgent, createdAt, expiresAt }) => ({
			id,
			browser: browserWords(userAgent),
			since: words(createdAt),
			until: dayWords(dayInZone(expiresAt, zone)),
			isThis: id === person.sessionId,
		})),
	}
})

export const action = guard(admits.signedIn, async ({ request }: Route.ActionArgs, { person }) => {
	const sessionId = z.guid().safeParse((await request.formData()).get("sessionId"))
	if (!sessionId.success) throw data(null, { status: 404 })
	await endSession(person.id, sessionId.data)
	if (sessionId.data !== person.sessionId) return redirect("/account/sessions")
	return redirect("/sign-in", { headers: settingCookies([noSessionCookie()]) })
})

export default function Sessions({ loaderData: { sessions, zone } }: Route.ComponentProps) {
	return (
		<PlainPage
			title="Where you are signed in"
			lead={`Each lasts 30 days from signing in. End one that you do not know or use no more. Times are for ${zone.replaceAll("_", " ")}.`}
		>
			<ul className="border-t border-ink">
				{sessions.map((session) => (
					<li
						key={session.id}
						className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2 border-b border-rule py-3"
					>
						<div>
							<h2 className="name">
								{session.browser}
								{session.isThis && " (this one)"}
							</h2>
							<p>
								Since {session.since}; good until {session.until}
							</p>
						</div>
						<Form method="post">
							<input type="hidden" name="sessionId" value={session.id} />
							<Button aria-label={`End ${session.browser}, since ${session.since}`}>
								{session.isThis ? "Sign out here" : "End it"}
							</Button>
						</Form>
					</li>
				))}
			</ul>
			<p className="mt-4">
				<Link className="underline underline-offset-4" to="/account">
					Your account
				</Link>
			</p>
		</PlainPage>
	)
}
