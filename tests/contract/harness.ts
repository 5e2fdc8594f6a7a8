import { createServer } from "node:http"
import type { AddressInfo } from "node:net"
import type Stripe from "stripe"
import { afterEach } from "vitest"
import { createStripe } from "~/platform/stripe.server"
import { type StripeFake, type StripeFakeOptions, startStripeFake } from "../../fakes/stripe/start"

export const SECRET_KEY = "sk_test_contract"
export const WEBHOOK_SECRET = "whsec_contract"

const closers: (() => Promise<void>)[] = []
afterEach(async () => {
	for (const close of closers.splice(0).reverse()) await close()
})

export type Received = { body: string; signature: string; event: Stripe.Event }

/** An endpoint for events that keeps what it is sent and answers what `answer` says for the nth post, 200 by default. */
export async function startEndpoint(answer: (nth: number) => number = () => 200) {
	const received: Received[] = []
	let arrived = () => {}
	const server = createServer(async (request, response) => {
		let body = ""
		for await (const part of request) body += part
		received.push({ body, signature: String(request.headers["stripe-signature"]), event: JSON.parse(body) })
		response.writeHead(answer(received.length)).end()
		arrived()
	})
	await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve))
	closers.push(
		() =>
			new Promise((resolve) => {
				server.close(() => resolve())
				server.closeAllConnections()
			}),
	)
	return {
		url: `http://127.0.0.1:${(server.address() as AddressInfo).port}/events`,
		received,
		types: () => received.map(({ event }) => event.type),
		/** Resolves once `count` posts have arrived in all. */
		until: (count: number) =>
			new Promise<void>((resolve) => {
				arrived = () => {
					if (received.length >= count) resolve()
				}
				arrived()
			}),
	}
}

/** A fake with a client of ours that talks to it; both end with the test. */
export async function startFake(options: StripeFakeOptions = {}): Promise<{ fake: StripeFake; stripe: Stripe }> {
	const fake = await startStripeFake(options)
	closers.push(fake.close)
	return { fake, stripe: createStripe({ secretKey: SECRET_KEY, apiBase: fake.url }) }
}

/** A fake that posts its events to an endpoint. */
export async function startFakeWithEndpoint(
	answer?: (nth: number) => number,
	options: StripeFakeOptions = {},
): Promise<{ fake: StripeFake; stripe: Stripe; endpoint: Awaited<ReturnType<typeof startEndpoint>> }> {
	const endpoint = await startEndpoint(answer)
	const started = await startFake({ webhook: { url: endpoint.url, secret: WEBHOOK_SECRET }, ...options })
	return { ...started, endpoint }
}

export const sessionOf = (cents: number): Stripe.Checkout.SessionCreateParams => ({
	mode: "payment",
	line_items: [
		{ quantity: 1, price_data: { currency: "usd", unit_amount: cents, product_data: { name: "Invoice 2026-0007" } } },
	],
	client_reference_id: "inv_7",
	metadata: { invoice: "7" },
	payment_intent_data: { metadata: { invoice: "7", producer: "3" } },
	customer_email: "books@corner.example.test",
	success_url: "http://shop.example.test/paid?session={CHECKOUT_SESSION_ID}",
	cancel_url: "http://shop.example.test/invoice/7",
})

/** What a person does on the hosted page: posts its form. Redirects are not followed. */
export function postForm(url: string | null, fields: Record<string, string>): Promise<Response> {
	return fetch(String(url), { method: "POST", body: new URLSearchParams(fields), redirect: "manual" })
}

export const card = (number: string) => ({ number, expiry: "12/34", cvc: "123", name: "Robin Vale" })

/** The refusal that `call` ends in; fails the test when the call goes through. */
export async function refusal(call: Promise<unknown>): Promise<Stripe.errors.StripeError> {
	try {
		await call
	} catch (error) {
		return error as Stripe.errors.StripeError
	}
	throw new Error("The call went through")
}
