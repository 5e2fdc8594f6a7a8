import { useEffect } from "react"
import { data, Form, redirect } from "react-router"
import { clientNetwork } from "~/platform/client-network.server"
import { findLanding } from "~/services/people/find-landing.server"
import { readKeptPostTicket } from "~/services/people/kept-post-cookie.server"
import { requestCode } from "~/services/people/request-code.server"
import { safeTarget } from "~/services/people/safe-target.server"
import { forgetKeptPages } from "~/ui/crop/yard-offline"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sign-in"
import { settingCookies } from "./cookie-headers.server"
import { emailField, waitWords, withTarget } from "./sign-in-fields"

export const meta: Route.MetaFunction = () => [{ title: "Sign in · Waxbill" }]

export const loader = guard(admits.anyone, async ({ request, url }: Route.LoaderArgs, { person }) => {
	if (person) throw redirect(await findLanding(person.id, request, url.searchParams.get("to")))
	const kept = readKeptPostTicket(request)
	return { isPostKept: kept !== null && !kept.wasSent }
})

/** Asks for a code. The answer is the same whether or not anybody has the address. */
export const action = guard(admits.anyone, async ({ request, url }: Route.ActionArgs) => {
	const typed = String((await request.formData()).get("email") ?? "")
	const email = emailField.safeParse(typed)
	const refuse = (status: number, field: "email" | undefined, message: string) =>
		data({ typed, error: { field, message } }, { status })
	if (!email.success) return refuse(400, "email", email.error.issues[0]?.message ?? "")
	const to = safeTarget(url.searchParams.get("to"))
	const asked = await requestCode({ email: email.data, network: clientNetwork(request), to })
	if (!asked.ok) {
		const wait = `Too many codes were asked for. You can ask again ${waitWords(asked.retryAfterSeconds)}.`
		return refuse(429, undefined, wait)
	}
	return redirect(withTarget("/sign-in/code", to), { headers: settingCookies(asked.cookies) })
})

export default function SignIn({ loaderData, actionData }: Route.ComponentProps) {
	const error = actionData?.error
	// Signing out leads here; what the last person could open without signal goes with their session.
	useEffect(forgetKeptPages, [])
	return (
		<PlainPage title="Sign in" lead="We send a six-digit code to your e-mail address. There is no password.">
			{error && <ErrorSummary errors={[error]} />}
			{loaderData.isPostKept && (
				<p className="message-line saved" role="status">
					You were signed out. What you typed is kept for an hour: sign in, and you can send it.
				</p>
			)}
			<Form method="post" className="mt-4 grid gap-4" noValidate>
				<TextField
					name="email"
					label="E-mail address"
					hint="The one that your invitation came to."
					type="email"
					autoComplete="email"
					inputMode="email"
					spellCheck={false}
					defaultValue={actionData?.typed}
					error={error?.field === "email" ? error.message : undefined}
				/>
				<div>
					<Button variant="primary" size="big">
						Send me a code
					</Button>
				</div>
			</Form>
		</PlainPage>
	)
}
