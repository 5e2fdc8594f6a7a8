import { data, Form, Link, redirect } from "react-router"
import { clientNetwork } from "~/platform/client-network.server"
import { findLanding } from "~/services/people/find-landing.server"
import { safeTarget } from "~/services/people/safe-target.server"
import { findLink, signInByLink } from "~/services/people/sign-in-by-link.server"
import { Button } from "~/ui/forms/button"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sign-in-link"
import { settingCookies } from "./cookie-headers.server"
import { withTarget } from "./sign-in-fields"

export const meta: Route.MetaFunction = () => [{ title: "Sign in · Waxbill" }, { name: "robots", content: "noindex" }]

/** Opening the link changes nothing: programs that scan mail open links too. */
export const loader = guard(admits.anyone, async ({ params, url }: Route.LoaderArgs) => {
	const email = await findLink(params.token)
	return data({ email, to: safeTarget(url.searchParams.get("to")) }, { status: email === null ? 410 : 200 })
})

export const action = guard(admits.anyone, async ({ request, params, url }: Route.ActionArgs) => {
	const to = url.searchParams.get("to")
	const signedIn = await signInByLink(params.token, request, clientNetwork(request))
	// The page itself says that the link is good no more.
	if (!signedIn) throw redirect(url.pathname + url.search)
	throw redirect(await findLanding(signedIn.userId, request, to), { headers: settingCookies(signedIn.cookies) })
})

export default function SignInLink({ loaderData: { email, to } }: Route.ComponentProps) {
	if (email === null) {
		return (
			<PlainPage title="This link works no more" lead="It signs in once, within ten minutes. Have a new one sent.">
				<Link className="btn primary big" to={withTarget("/sign-in", to)}>
					Send me a new one
				</Link>
			</PlainPage>
		)
	}
	return (
		<PlainPage
			title="Sign in on this device"
			lead={
				<>
					You are about to sign in as <strong className="break-all">{email}</strong>.
				</>
			}
		>
			<Form method="post">
				<Button variant="primary" size="big">
					Sign in
				</Button>
			</Form>
		</PlainPage>
	)
}
