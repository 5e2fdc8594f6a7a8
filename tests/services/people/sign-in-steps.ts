import { randomUUID } from "node:crypto"
import { checkCode } from "~/services/people/check-code.server"
import { readCodeTicket } from "~/services/people/code-cookie.server"
import { requestCode } from "~/services/people/request-code.server"
import type { Browser } from "./browser"
import { newestMail } from "./people-rows"

/** A network that no other test counts for. */
export const someNetwork = () => randomUUID()

/** Has a code mailed and answers it; the browser then waits for it. */
export async function askForCode(browser: Browser, email: string, to: string | null = null): Promise<string> {
	const asked = await requestCode({ email, network: someNetwork(), to })
	if (!asked.ok) throw new Error("refused")
	browser.take(asked.cookies)
	return (await newestMail(email)).code
}

/** Types a code in the browser as it is now; its new cookies are taken over. */
export async function typeCode(browser: Browser, code: string) {
	const request = browser.post("/sign-in/code", { code })
	const ticket = readCodeTicket(request)
	if (!ticket) return { ok: false, reason: "waits-for-nothing" } as const
	const checked = await checkCode(ticket, code, request, someNetwork())
	if (checked.ok) browser.take(checked.cookies)
	return checked
}

/** Signs the browser in. */
export async function signIn(browser: Browser, email: string): Promise<void> {
	const checked = await typeCode(browser, await askForCode(browser, email))
	if (!checked.ok) throw new Error(checked.reason)
}

/** A code of six digits that is not this one. */
export const otherCode = (code: string) => String((Number(code) + 1) % 1_000_000).padStart(6, "0")
