import { expect, test } from "vitest"
import { createStripe } from "~/platform/stripe.server"
import { refusal, SECRET_KEY, startFake } from "./harness"

const payment = { amount: 1250, currency: "usd", confirm: true, payment_method: "pm_card_visa" }

test("a slow answer is given up after the client's patience, and the key saves it from being charged twice", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ slowMs: 400 })
	const call = stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1", timeout: 100, maxNetworkRetries: 0 })
	expect(await refusal(call)).toMatchObject({ type: "StripeConnectionError" })
	fake.switch({ slowMs: 0 })
	const paid = await stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	expect(paid.status).toBe("succeeded")
	expect(fake.state.charges.size).toBe(1)
})

test("a call that meets a server error is repeated by the client and charges once", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ failNext: { count: 2, status: 500 } })
	const paid = await stripe.paymentIntents.create(payment)
	expect(paid.status).toBe("succeeded")
	expect(fake.state.charges.size).toBe(1)
})

test("more errors than the client bears reach the caller", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ failNext: { count: 3, status: 500 } })
	expect(await refusal(stripe.paymentIntents.create(payment))).toMatchObject({
		type: "StripeAPIError",
		statusCode: 500,
	})
	expect(fake.state.charges.size).toBe(0)
})

test("too many requests are not repeated by the client; the caller can", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ failNext: { count: 1, status: 429 } })
	const call = () => stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	expect(await refusal(call())).toMatchObject({ type: "StripeRateLimitError", statusCode: 429, code: "rate_limit" })
	expect((await call()).status).toBe("succeeded")
	expect(fake.state.charges.size).toBe(1)
})

test.each(["before", "after"] as const)("a connection lost %s the effect leads to one charge", async (when) => {
	const { stripe, fake } = await startFake()
	fake.switch({ dropNext: { when } })
	const paid = await stripe.paymentIntents.create(payment)
	expect(paid.status).toBe("succeeded")
	expect(fake.state.charges.size).toBe(1)
	expect(fake.state.intents.size).toBe(1)
})

test("an answer that is lost twice is an error though the payment was made, and the key finds it again", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ dropNext: { when: "after", count: 2 } })
	// A closed connection is tried once more by the client even without retries.
	const call = () => stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1", maxNetworkRetries: 0 })
	expect(await refusal(call())).toMatchObject({ type: "StripeConnectionError" })
	expect(fake.state.charges.size).toBe(1)
	expect((await call()).status).toBe("succeeded")
	expect(fake.state.charges.size).toBe(1)
})

test("a fault can be kept to one part of the interface", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ failNext: { count: 1, status: 429, path: "/v1/refunds" } })
	expect((await stripe.customers.list()).data).toEqual([])
	expect(await refusal(stripe.refunds.list())).toMatchObject({ statusCode: 429 })
	expect((await stripe.refunds.list()).data).toEqual([])
})

test("a server that is away is a connection error", async () => {
	const { fake } = await startFake()
	await fake.close()
	const stripe = createStripe({ secretKey: SECRET_KEY, apiBase: fake.url })
	const call = stripe.customers.list({}, { maxNetworkRetries: 0 })
	expect(await refusal(call)).toMatchObject({ type: "StripeConnectionError" })
})
