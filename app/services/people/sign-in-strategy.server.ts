import { Authenticator } from "remix-auth"
import { TOTPStrategy } from "remix-auth-totp"
import { isOverTls } from "~/platform/cookies.server"
import { env } from "~/platform/env.server"
import { keyFor } from "~/platform/secrets.server"

/** How long a code and the link beside it are good for. */
export const CODE_MINUTES = 10

const SENT = "/sent"
const VERIFIED = "/verified"
const REFUSED = "/refused"

type Hooks = {
	/** Writes the code down and has it mailed. */
	send?: (code: string) => Promise<void>
	/** Has the last word on a code that the strategy takes for right; false refuses it. */
	verify?: (email: string) => Promise<boolean>
}

/**
 * Has the strategy make a code for `email` and hand it to `send`. Answers the Set-Cookie line with the strategy's half of
 * the secret. Throws what `send` throws.
 */
export async function makeCode(email: string, send: (code: string) => Promise<void>): Promise<string> {
	const answer = await ask({ email }, null, { send })
	return cookieOf(answer, SENT)
}

/**
 * Asks the strategy whether `code` belongs to the cookie that the browser holds, then `verify`. Answers the Set-Cookie
 * line that forgets the strategy's half, or null when either refuses. Throws what `verify` throws.
 *
 * The strategy alone proves nothing: its cookie is not signed and can be edited, it counts no tries and takes a code
 * again. So `verify` must compare the address with the table's, and spend the code there.
 */
export async function checkWithStrategy(
	code: string,
	request: Request,
	verify: (email: string) => Promise<boolean>,
): Promise<string | null> {
	const answer = await ask({ code }, request.headers.get("cookie"), { verify })
	return answer.headers.get("location") === VERIFIED ? cookieOf(answer, VERIFIED) : null
}

/** One exchange with the strategy, by a request made here: neither the visitor's host nor any other field reaches it. */
async function ask(fields: Record<string, string>, cookie: string | null, hooks: Hooks): Promise<Response> {
	let failure: { error: unknown } | undefined
	// The strategy turns any Error into a redirect; one of ours must come out as it is.
	const watched = async <T>(work: () => Promise<T>): Promise<T> => {
		try {
			return await work()
		} catch (error) {
			failure = { error }
			throw error
		}
	}
	const strategy = new TOTPStrategy<void>(
		{
			secret: keyFor("totp").toString("hex"),
			emailSentRedirect: SENT,
			successRedirect: VERIFIED,
			failureRedirect: REFUSED,
			totpGeneration: { digits: 6, charSet: "0123456789", period: CODE_MINUTES * 60 },
			cookieOptions: { maxAge: CODE_MINUTES * 60, ...(isOverTls() && { secure: true }) },
			// Addresses are checked by the form's own rule before they come here.
			validateEmail: async () => true,
			sendTOTP: ({ code }) => watched(async () => hooks.send?.(code)),
		},
		async ({ email }) => {
			if (!(await watched(async () => hooks.verify?.(email)))) throw new Error("refused")
		},
	)
	const answer = await answerOf(strategy, fields, cookie)
	if (failure) throw failure.error
	return answer
}

async function answerOf(
	strategy: TOTPStrategy<void>,
	fields: Record<string, string>,
	cookie: string | null,
): Promise<Response> {
	const request = new Request(`${env.BASE_URL}/sign-in/code`, {
		method: "POST",
		body: new URLSearchParams(fields),
		headers: cookie ? { cookie } : {},
	})
	try {
		await new Authenticator<void>().use(strategy, "code").authenticate("code", request)
	} catch (answer) {
		if (answer instanceof Response) return answer
		throw answer
	}
	throw new Error("the strategy answers by throwing a redirect, and did not")
}

/** The last of the two lines it sets; both are the same. */
function cookieOf(answer: Response, expected: string): string {
	const cookie = answer.headers.getSetCookie().at(-1)
	if (answer.headers.get("location") !== expected || cookie === undefined) throw new Error("the strategy made no code")
	return cookie
}
