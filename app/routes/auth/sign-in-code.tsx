import { data, Form, Link, redirect } from "react-router"
import { clientNetwork } from "~/platform/client-network.server"
import { type CodeRefusal, checkCode } from "~/services/people/check-code.server"
import { type CodeTicket, readCodeTicket } from "~/services/people/code-cookie.server"
import { findLanding } from "~/services/people/find-landing.server"
import { requestCode } from "~/services/people/request-code.server"
import { safeTarget } from "~/services/people/safe-target.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sign-in-code"
import { settingCookies } from "./cookie-headers.server"
import { codeField, waitWords, withTarget } from "./sign-in-fields"

export const meta: Route.MetaFunction = () => [{ title: "Type the code · Waxbill" }]

export const loader = guard(admits.anyone, async ({ request, url }: Route.LoaderArgs) => {
	const to = safeTarget(url.searchParams.get("to"))
	return { email: ticketOrStart(request, to).email, wasSentAgain: url.searchParams.has("again"), to }
})

export const action = guard(admits.anyone, async ({ request, url }: Route.ActionArgs) => {
	const to = safeTarget(url.searchParams.get("to"))
	const ticket = ticketOrStart(request, to)
	const form = await request.formData()
	if (form.get("intent") === "again") return sendAgain(ticket, to, request)
	const typed = String(form.get("code") ?? "")
	const code = codeField.safeParse(typed)
	if (!code.success) return refuse(400, code.error.issues[0]?.message ?? "", typed)
	const checked = await checkCode(ticket, code.data, request, clientNetwork(request))
	if (!checked.ok) return refuse(checked.reason === "too-many" ? 429 : 400, refusalWords(checked), typed)
	throw redirect(await findLanding(checked.userId, request, to), { headers: settingCookies(checked.cookies) })
})

/** What the browser waits for; one that waits for nothing begins at the address. */
function ticketOrStart(request: Request, to: string | null): CodeTicket {
	const ticket = readCodeTicket(request)
	if (!ticket) throw redirect(withTarget("/sign-in", to))
	return ticket
}

async function sendAgain(ticket: CodeTicket, to: string | null, request: Request) {
	const asked = await requestCode({ email: ticket.email, network: clientNetwork(request), to })
	if (!asked.ok) {
		const wait = `Too many codes were asked for. You can ask again ${waitWords(asked.retryAfterSeconds)}.`
		return refuse(429, wait, "")
	}
	const page = new URLSearchParams({ again: "", ...(to !== null && { to }) })
	throw redirect(`/sign-in/code?${page}`, { headers: settingCookies(asked.cookies) })
}

function refuse(status: number, message: string, typed: string) {
	return data({ message, typed }, { status })
}

function refusalWords(refusal: CodeRefusal): string {
	if (refusal.reason === "too-many")
		return `Too many codes were tried. You can try again ${waitWords(refusal.retryAfterSeconds)}.`
	if (refusal.reason === "spent") return "This code works no more. Have a new one sent."
	const left = refusal.triesLeft === 1 ? "One more try" : `${refusal.triesLeft} more tries`
	return `This is not the code in the newest mail. ${left}.`
}

export default function SignInCode({ loaderData, actionData }: Route.ComponentProps) {
	const { email, wasSentAgain, to } = loaderData
	return (
		<PlainPage
			title="Type the code"
			lead={
				<>
					We have sent a mail to <strong className="break-all">{email}</strong>. It comes within a minute or two; the
					code in it works once, for ten minutes. The link in it works on any device.
				</>
			}
		>
			{actionData && <ErrorSummary errors={[{ field: "code", message: actionData.message }]} />}
			{wasSentAgain && !actionData && (
				<p className="message-line saved" role="status">
					A new mail is on its way. Only the code in it counts here.
				</p>
			)}
			<Form method="post" className="mt-4 grid gap-4" noValidate>
				<TextField
					name="code"
					label="Six-digit code"
					inputMode="numeric"
					autoComplete="one-time-code"
					maxLength={16}
					defaultValue={actionData?.typed}
					error={actionData?.message}
				/>
				<div>
					<Button variant="primary" size="big" name="intent" value="check">
						Sign in
					</Button>
				</div>
			</Form>
			<Form method="post" className="mt-6 flex flex-wrap items-center gap-3">
				<Button name="intent" value="again">
					Send a new code
				</Button>
				<Link className="btn plain" to={withTarget("/sign-in", to)}>
					Use another address
				</Link>
			</Form>
		</PlainPage>
	)
}
