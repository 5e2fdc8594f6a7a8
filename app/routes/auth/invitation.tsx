import { data, Form, Link, redirect } from "react-router"
import { clientNetwork } from "~/platform/client-network.server"
import { acceptInvitation } from "~/services/people/accept-invitation.server"
import { findInvitation, type OpenInvitation } from "~/services/people/find-invitation.server"
import { findLanding } from "~/services/people/find-landing.server"
import { requestCode } from "~/services/people/request-code.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { PlainPage } from "~/ui/layout/plain-page"
import { roleWords } from "../desk/role-words"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/invitation"
import { settingCookies } from "./cookie-headers.server"
import { waitWords, withTarget } from "./sign-in-fields"

export const meta: Route.MetaFunction = () => [
	{ title: "An invitation · Waxbill" },
	{ name: "robots", content: "noindex" },
]

export const loader = guard(admits.anyone, async ({ params }: Route.LoaderArgs, { person }) => {
	const invitation = await findInvitation(params.token)
	return data({ invitation, signedInAs: person?.email ?? null }, { status: invitation ? 200 : 410 })
})

/** Signed in with the invited address, it accepts; signed out, it has a code sent to that address and comes back here. */
export const action = guard(admits.anyone, async ({ request, params, url }: Route.ActionArgs, { person }) => {
	if (person) {
		// Where it was not theirs or is open no more, the page says so.
		const accepted = await acceptInvitation(params.token, person)
		throw redirect(accepted ? await findLanding(person.id, request, null) : url.pathname)
	}
	const invitation = await findInvitation(params.token)
	if (!invitation) throw redirect(url.pathname)
	const asked = await requestCode({ email: invitation.email, network: clientNetwork(request), to: url.pathname })
	if (asked.ok) throw redirect(withTarget("/sign-in/code", url.pathname), { headers: settingCookies(asked.cookies) })
	const wait = `Too many codes were asked for. You can ask again ${waitWords(asked.retryAfterSeconds)}.`
	return data({ message: wait }, { status: 429 })
})

export default function Invitation({ loaderData: { invitation, signedInAs }, actionData }: Route.ComponentProps) {
	if (!invitation) {
		return (
			<PlainPage
				title="This invitation is open no more"
				lead="It was accepted, taken back, or is older than two weeks. If you have accepted it, sign in; if not, ask for a new one."
			>
				<Link className="btn primary big" to="/sign-in">
					Sign in
				</Link>
			</PlainPage>
		)
	}
	return (
		<PlainPage title={`${invitation.producerName} invites you`} lead={leadOf(invitation)}>
			{actionData && <ErrorSummary errors={[actionData]} />}
			<Answer invitation={invitation} signedInAs={signedInAs} />
		</PlainPage>
	)
}

function leadOf({ invitedBy, role, storeName, producerName }: OpenInvitation): string {
	const whom = storeName ? ` for ${storeName}` : ` at ${producerName}`
	return `${invitedBy} invites you to ${roleWords(role).purpose}${whom}.`
}

function Answer({ invitation, signedInAs }: { invitation: OpenInvitation; signedInAs: string | null }) {
	if (signedInAs === invitation.email) {
		return (
			<Form method="post">
				<Button variant="primary" size="big">
					Accept
				</Button>
			</Form>
		)
	}
	if (signedInAs === null) {
		return (
			<Form method="post" className="grid gap-4">
				<p>
					First we make sure that it is you: we send a six-digit code to{" "}
					<strong className="break-all">{invitation.email}</strong>. There is no password.
				</p>
				<div>
					<Button variant="primary" size="big">
						Send me a code
					</Button>
				</div>
			</Form>
		)
	}
	return (
		<div className="grid gap-4">
			<p>
				The invitation is for <strong className="break-all">{invitation.email}</strong>, and you are signed in as{" "}
				<strong className="break-all">{signedInAs}</strong>. Sign out, then open the link in the letter again.
			</p>
			<Form method="post" action="/sign-out">
				<Button size="big">Sign out</Button>
			</Form>
		</div>
	)
}
