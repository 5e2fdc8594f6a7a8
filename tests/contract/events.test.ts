import Stripe from "stripe"
import { expect, test } from "vitest"
import { verifyStripeEvent } from "~/platform/stripe.server"
import { pauseAfter } from "../../fakes/stripe/webhooks"
import { card, postForm, sessionOf, startFake, startFakeWithEndpoint, WEBHOOK_SECRET } from "./harness"

const QUICK = { retry: { firstMs: 1, longestMs: 4 } }

test("an event is signed so that the SDK accepts it, and only with our secret, body and time", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const customer = await stripe.customers.create({ name: "Corner Store" }, { idempotencyKey: "store-1" })
	await fake.idle()
	const [got] = endpoint.received
	if (!got) throw new Error("No event arrived")
	const event = verifyStripeEvent(got.body, got.signature, WEBHOOK_SECRET)
	expect(event).toMatchObject({
		object: "event",
		type: "customer.created",
		api_version: Stripe.API_VERSION,
		livemode: false,
		data: { object: { id: customer.id } },
		request: { id: customer.lastResponse.requestId, idempotency_key: "store-1" },
	})
	const { StripeSignatureVerificationError } = Stripe.errors
	const tampered = got.body.replace("Corner Store", "Corner Shop!")
	expect(tampered).not.toBe(got.body)
	expect(() => verifyStripeEvent(tampered, got.signature, WEBHOOK_SECRET)).toThrow(StripeSignatureVerificationError)
	const rewritten = JSON.stringify(JSON.parse(got.body))
	expect(() => verifyStripeEvent(rewritten, got.signature, WEBHOOK_SECRET)).toThrow(StripeSignatureVerificationError)
	expect(() => verifyStripeEvent(got.body, got.signature, "whsec_other")).toThrow(StripeSignatureVerificationError)
	expect(() => verifyStripeEvent(got.body, null, WEBHOOK_SECRET)).toThrow(StripeSignatureVerificationError)
	const timestamp = Math.floor(Date.now() / 1000) - 301
	const old = stripe.webhooks.generateTestHeaderString({ payload: got.body, secret: WEBHOOK_SECRET, timestamp })
	expect(() => verifyStripeEvent(got.body, old, WEBHOOK_SECRET)).toThrow(StripeSignatureVerificationError)
})

test("an event that is not accepted comes again, the same, until it is", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint((nth) => (nth < 4 ? 503 : 200), QUICK)
	await stripe.customers.create({ name: "Corner Store" })
	await endpoint.until(4)
	const ids = endpoint.received.map(({ event }) => event.id)
	expect(new Set(ids).size).toBe(1)
	await expect.poll(async () => (await stripe.events.retrieve(String(ids[0]))).pending_webhooks).toBe(0)
	expect(fake.state.deliveries.map(({ status }) => status)).toEqual([503, 503, 503, 200])
	expect(endpoint.received).toHaveLength(4)
})

test("the pause before an event comes again doubles up to a limit", () => {
	const pause = { firstMs: 1000, longestMs: 60_000, tries: 40 }
	const pauses = [1, 2, 3, 6, 7, 40].map((attempt) => pauseAfter(attempt, pause))
	expect(pauses).toEqual([1000, 2000, 4000, 32_000, 60_000, 60_000])
})

test("a redirect is no acceptance, and a later event does not wait for an earlier one that fails", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint((nth) => (nth === 1 ? 302 : 200))
	fake.switch({ holdEvents: true })
	await stripe.customers.create({ name: "First" })
	await stripe.customers.create({ name: "Second" })
	await fake.flushEvents("created")
	await endpoint.until(3)
	const names = endpoint.received.map(({ event }) => (event.data.object as Stripe.Customer).name)
	expect(names).toEqual(["First", "Second", "First"])
})

test("an endpoint that is away is tried a set number of times, and the event stays pending", async () => {
	const { stripe, fake } = await startFake({
		webhook: { url: "http://127.0.0.1:9/nobody", secret: WEBHOOK_SECRET },
		retry: { firstMs: 1, longestMs: 1, tries: 3 },
	})
	await stripe.customers.create({ name: "Corner Store" })
	await expect.poll(() => fake.state.deliveries.map(({ status }) => status)).toEqual([null, null, null])
	const { data } = await stripe.events.list({ type: "customer.created" })
	expect(data.map((event) => event.pending_webhooks)).toEqual([1])
})

test("an event can be made to come several times, with one id", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	fake.switch({ repeatEvents: 2 })
	await stripe.customers.create({ name: "Corner Store" })
	await fake.idle()
	expect(endpoint.types()).toEqual(Array(3).fill("customer.created"))
	expect(new Set(endpoint.received.map(({ event }) => event.id)).size).toBe(1)
	for (const { body, signature } of endpoint.received) {
		expect(verifyStripeEvent(body, signature, WEBHOOK_SECRET).type).toBe("customer.created")
	}
})

test("held events come in reverse, with what was true when each was made", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	fake.switch({ holdEvents: true })
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	await postForm(session.url, card("4242424242424242"))
	await fake.idle()
	expect(endpoint.received).toEqual([])
	await fake.flushEvents("reverse")
	expect(endpoint.types()).toEqual([
		"checkout.session.completed",
		"payment_intent.succeeded",
		"charge.succeeded",
		"payment_intent.created",
	])
	expect(endpoint.received[3]?.event.data.object).toMatchObject({ status: "requires_payment_method" })
})

test("when holding ends, what was held comes in order", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	fake.switch({ holdEvents: true })
	const customer = await stripe.customers.create({ name: "Corner Store" })
	await stripe.customers.update(customer.id, { name: "Corner Shop" })
	fake.switch({ holdEvents: false })
	await fake.idle()
	expect(endpoint.types()).toEqual(["customer.created", "customer.updated"])
})

test("muted events never come, but are listed for whoever reconciles", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	fake.switch({ muteEvents: true })
	await stripe.customers.create({ name: "Corner Store" })
	fake.switch({ muteEvents: false })
	await fake.idle()
	expect(endpoint.received).toEqual([])
	expect((await stripe.events.list({ types: ["customer.created"] })).data).toHaveLength(1)
	expect((await stripe.events.list({ type: "customer.*" })).data).toHaveLength(1)
	expect((await stripe.events.list({ type: "charge.*" })).data).toEqual([])
})
