import type { IncomingMessage, ServerResponse } from "node:http"
import { setTimeout as pause } from "node:timers/promises"
import { balanceEndpoints } from "./balance"
import { chargeEndpoints } from "./charges"
import { checkoutSessionEndpoints } from "./checkout-sessions"
import { customerEndpoints } from "./customers"
import { disputeEndpoints } from "./disputes"
import { StripeRefusal } from "./errors"
import { eventEndpoints } from "./event-endpoints"
import { expand } from "./expand"
import type { Fake } from "./fake"
import { type FormTree, parseForm } from "./form"
import { readBody, sendJson } from "./http"
import { createIdempotency, fingerprintOf } from "./idempotency"
import { newId } from "./ids"
import { paymentIntentEndpoints } from "./payment-intents"
import { paymentMethodEndpoints } from "./payment-methods"
import { payoutEndpoints } from "./payouts"
import { readerEndpoints } from "./readers"
import { refundEndpoints } from "./refunds"
import { createRouter } from "./router"
import { setupIntentEndpoints } from "./setup-intents"
import { strikes } from "./switches"

const route = createRouter({
	...balanceEndpoints,
	...chargeEndpoints,
	...checkoutSessionEndpoints,
	...customerEndpoints,
	...disputeEndpoints,
	...eventEndpoints,
	...paymentIntentEndpoints,
	...paymentMethodEndpoints,
	...payoutEndpoints,
	...readerEndpoints,
	...refundEndpoints,
	...setupIntentEndpoints,
})

/** A call that ends without an answer, by the switch `dropNext`. */
class Dropped extends Error {}

/** Refuses a call without a secret test key; live keys are refused too, so that none is ever used here by mistake. */
function checkKey(request: IncomingMessage): void {
	const header = request.headers.authorization ?? ""
	const [scheme = "", given = ""] = header.split(" ")
	const key = scheme === "Basic" ? (Buffer.from(given, "base64").toString().split(":")[0] ?? "") : given
	if (!key) {
		throw new StripeRefusal(401, {
			type: "invalid_request_error",
			message:
				"You did not provide an API key. You need to provide your API key in the Authorization header, using Bearer auth (e.g. 'Authorization: Bearer YOUR_SECRET_KEY').",
		})
	}
	if (!/^(sk|rk)_test_/.test(key)) {
		throw new StripeRefusal(401, {
			type: "invalid_request_error",
			message: `Invalid API Key provided: ${key.slice(0, 8)}****. The payment fake takes keys that begin with sk_test_.`,
		})
	}
}

function failBySwitch(fake: Fake, path: string): void {
	const { failNext } = fake.switches
	if (!failNext || !strikes(failNext, path)) return
	if (failNext.status === 429) {
		throw new StripeRefusal(429, {
			type: "invalid_request_error",
			code: "rate_limit",
			message: "Request rate limit exceeded. Learn more about rate limits in the documentation.",
		})
	}
	throw new StripeRefusal(500, { type: "api_error", message: "An unknown error occurred." })
}

function expandPaths(form: FormTree): string[] {
	return typeof form.expand === "object" ? Object.values(form.expand).map(String) : []
}

type Answer = { status: number; body: string; headers: Record<string, string>; kept: boolean }

function refusalAnswer(error: unknown): Answer {
	const refusal =
		error instanceof StripeRefusal
			? error
			: new StripeRefusal(500, { type: "api_error", message: `The payment fake failed: ${String(error)}` })
	const body = JSON.stringify({ error: refusal.body }, null, 2)
	// A card that was declined took effect; every other refusal came before anything was done and may be tried again.
	return { status: refusal.status, body, headers: refusal.headers, kept: refusal.status === 402 }
}

/** Answers the calls under /v1: secret key, faults, idempotency, slowness, endpoint, in that order. */
export function createApi(fake: Fake, clock: () => number, saved: () => void) {
	const idempotency = createIdempotency(fake.store, clock)

	function run(method: string, path: string, form: FormTree, requestId: string, key: string | null): Answer {
		try {
			const { handle, id } = route(method, path)
			const answer = handle({ fake, form, id, cause: { id: requestId, idempotency_key: key } })
			const body = JSON.stringify(expand(fake.store, answer, expandPaths(form)), null, 2)
			return { status: 200, body, headers: {}, kept: true }
		} catch (error) {
			return refusalAnswer(error)
		}
	}

	async function answer(request: IncomingMessage, requestId: string): Promise<Answer> {
		checkKey(request)
		const url = new URL(request.url ?? "/", "http://fake.invalid")
		const method = request.method ?? "GET"
		const text = method === "GET" ? url.search.slice(1) : await readBody(request)
		const header = method === "POST" ? request.headers["idempotency-key"] : undefined
		const key = typeof header === "string" && header !== "" ? header : null
		const fingerprint = fingerprintOf(url.pathname, text)
		// Faults strike before the key is looked at, so that a repeated call can meet one too.
		failBySwitch(fake, url.pathname)
		const { dropNext } = fake.switches
		const dropped = strikes(dropNext, url.pathname)
		if (dropped && dropNext?.when === "before") throw new Dropped()
		const kept = key === null ? undefined : idempotency.claim(key, fingerprint)
		if (kept) {
			if (dropped) throw new Dropped()
			const headers = { "Idempotent-Replayed": "true", "Original-Request": kept.requestId }
			return { status: kept.status, body: kept.body, headers, kept: false }
		}
		try {
			if (fake.switches.slowMs > 0) await pause(fake.switches.slowMs)
			const result = run(method, url.pathname, parseForm(text), requestId, key)
			if (key !== null && result.kept) {
				idempotency.keep(key, { fingerprint, status: result.status, body: result.body, requestId, at: clock() })
			}
			if (method === "POST") saved()
			if (dropped) throw new Dropped()
			return result
		} finally {
			if (key !== null) idempotency.release(key)
		}
	}

	return async (request: IncomingMessage, response: ServerResponse): Promise<void> => {
		const requestId = newId("req", 14)
		let result: Answer
		try {
			result = await answer(request, requestId)
		} catch (error) {
			if (error instanceof Dropped) {
				response.destroy()
				return
			}
			result = refusalAnswer(error)
		}
		const echoed: Record<string, string> = { "Request-Id": requestId }
		for (const name of ["Stripe-Version", "Idempotency-Key"]) {
			const value = request.headers[name.toLowerCase()]
			if (typeof value === "string") echoed[name] = value
		}
		sendJson(response, result.status, result.body, { ...echoed, ...result.headers })
	}
}
