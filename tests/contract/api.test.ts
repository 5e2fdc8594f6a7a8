import { expect, test } from "vitest"
import { createStripe } from "~/platform/stripe.server"
import { refusal, startFake } from "./harness"

test("a call without a key, or with a key that is no test key, is refused", async () => {
	const { fake } = await startFake()
	const bare = await fetch(`${fake.url}/v1/customers`)
	expect(bare.status).toBe(401)
	expect((await bare.json()).error.message).toContain("You did not provide an API key")

	const live = createStripe({ secretKey: "sk_live_never", apiBase: fake.url })
	expect(await refusal(live.customers.list())).toMatchObject({ type: "StripeAuthenticationError", statusCode: 401 })
})

test("each answer names its request and echoes the version and the key it was asked with", async () => {
	const { stripe } = await startFake()
	const customer = await stripe.customers.create({ name: "Corner Store" }, { idempotencyKey: "store-1" })
	expect(customer.lastResponse.requestId).toMatch(/^req_\w{14}$/)
	expect(customer.lastResponse.idempotencyKey).toBe("store-1")
	expect(customer.lastResponse.apiVersion).toBe("2026-10-28.endive")
})

test("an id that names nothing is refused with the name of what was looked for", async () => {
	const { stripe } = await startFake()
	expect(await refusal(stripe.paymentIntents.retrieve("pi_nothing"))).toMatchObject({
		type: "StripeInvalidRequestError",
		statusCode: 404,
		code: "resource_missing",
		message: "No such payment_intent: 'pi_nothing'",
		requestId: expect.stringMatching(/^req_/),
	})
})

test("a parameter that the fake does not know is refused, never passed over", async () => {
	const { stripe } = await startFake()
	const call = stripe.paymentIntents.create({ amount: 500, currency: "usd", application_fee_amount: 20 })
	expect(await refusal(call)).toMatchObject({ code: "parameter_unknown", param: "application_fee_amount" })
})

test("an address that the fake does not know is refused", async () => {
	const { stripe } = await startFake()
	expect(await refusal(stripe.products.list())).toMatchObject({ statusCode: 404 })
})

test("a missing, malformed or out-of-range amount is refused at its name", async () => {
	const { stripe } = await startFake()
	const amount = (cents: number) => refusal(stripe.paymentIntents.create({ amount: cents, currency: "usd" }))
	expect(await amount(49)).toMatchObject({ code: "amount_too_small", param: "amount" })
	expect(await amount(100_000_000)).toMatchObject({ code: "amount_too_large", param: "amount" })
	expect(await amount(-5)).toMatchObject({ code: "parameter_invalid_integer", param: "amount" })
	expect(await amount(12.5)).toMatchObject({ code: "parameter_invalid_integer", param: "amount" })
	const none = stripe.rawRequest("POST", "/v1/payment_intents", { currency: "usd" })
	expect(await refusal(none)).toMatchObject({ code: "parameter_missing", param: "amount" })
})

test("names in a body cannot reach into the objects of the program", async () => {
	const { fake, stripe } = await startFake()
	await fetch(`${fake.url}/v1/customers`, {
		method: "POST",
		headers: { Authorization: "Bearer sk_test_contract" },
		body: new URLSearchParams({ "__proto__[polluted]": "yes", "constructor[prototype][polluted]": "yes" }),
	})
	expect(Object.prototype).not.toHaveProperty("polluted")
	expect((await stripe.customers.list()).data).toEqual([])
})
