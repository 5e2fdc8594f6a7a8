import type Stripe from "stripe"
import { expect, test } from "vitest"
import { card, postForm, refusal, sessionOf, startFake, startFakeWithEndpoint } from "./harness"

async function customerOf(stripe: Stripe): Promise<string> {
	return (await stripe.customers.create({ name: "Corner Store", email: "books@corner.example.test" })).id
}

/** Keeps what a person types on the page of a session in the mode setup; answers the method's id. */
async function keep(stripe: Stripe, customer: string, fields: Record<string, string>): Promise<string> {
	const session = await stripe.checkout.sessions.create({
		mode: "setup",
		customer,
		currency: "usd",
		allowed_payment_method_types: [fields.account ? "us_bank_account" : "card"],
		setup_intent_data: { metadata: { store: "9" } },
		success_url: "http://shop.example.test/kept",
	})
	expect(session).toMatchObject({ mode: "setup", amount_total: null, payment_intent: null })
	await postForm(session.url, fields)
	const done = await stripe.checkout.sessions.retrieve(session.id, { expand: ["setup_intent.payment_method"] })
	expect(done).toMatchObject({ status: "complete", payment_status: "no_payment_required" })
	const intent = done.setup_intent as Stripe.SetupIntent
	expect(intent).toMatchObject({ status: "succeeded", customer, metadata: { store: "9" } })
	return (intent.payment_method as Stripe.PaymentMethod).id
}

const charge = (stripe: Stripe, customer: string, payment_method: string, cents = 4000) =>
	stripe.paymentIntents.create({
		amount: cents,
		currency: "usd",
		customer,
		payment_method,
		off_session: true,
		confirm: true,
		metadata: { store: "9" },
	})

test("a card that was kept is charged without its owner", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const customer = await customerOf(stripe)
	const method = await keep(stripe, customer, card("4242424242424242"))
	expect(await stripe.paymentMethods.retrieve(method)).toMatchObject({
		type: "card",
		card: { last4: "4242" },
		customer,
	})
	expect(await charge(stripe, customer, method)).toMatchObject({ status: "succeeded", amount_received: 4000 })
	await fake.idle()
	expect(endpoint.types()).toEqual([
		"customer.created",
		"setup_intent.created",
		"payment_method.attached",
		"setup_intent.succeeded",
		"checkout.session.completed",
		"payment_intent.created",
		"charge.succeeded",
		"payment_intent.succeeded",
	])
	expect(JSON.stringify(await (await fetch(`${fake.url}/_state`)).json())).not.toContain("4242424242424242")
})

test("a kept card may be declined, or want its owner who is not there", async () => {
	const { stripe } = await startFake()
	const customer = await customerOf(stripe)
	const empty = await keep(stripe, customer, card("4000000000000341"))
	expect(await refusal(charge(stripe, customer, empty))).toMatchObject({
		type: "StripeCardError",
		code: "card_declined",
		payment_intent: { status: "requires_payment_method", metadata: { store: "9" } },
	})
	const asks = await keep(stripe, customer, card("4000002760003184"))
	expect(await refusal(charge(stripe, customer, asks))).toMatchObject({ code: "authentication_required" })
})

test("a kept account is debited without its owner and clears later", async () => {
	const { stripe, fake } = await startFake()
	const customer = await customerOf(stripe)
	const fields = { routing: "110000000", account: "000123456789", name: "Corner Store" }
	const method = await keep(stripe, customer, fields)
	const intent = await charge(stripe, customer, method)
	expect(intent.status).toBe("processing")
	fake.bank({ step: "settle-debit", intent: intent.id })
	expect((await stripe.paymentIntents.retrieve(intent.id)).status).toBe("succeeded")
})

test("a card is kept along with a payment, and is no good to anyone else or once it is taken away", async () => {
	const { stripe } = await startFake()
	const customer = await customerOf(stripe)
	const { customer_email, ...rest } = sessionOf(2500)
	const session = await stripe.checkout.sessions.create({
		...rest,
		customer,
		payment_intent_data: { setup_future_usage: "off_session" },
	})
	await postForm(session.url, card("4242424242424242"))
	const [method] = (await stripe.customers.listPaymentMethods(customer)).data
	expect(method).toMatchObject({ card: { last4: "4242" } })
	const other = await customerOf(stripe)
	expect(await refusal(charge(stripe, other, method?.id ?? ""))).toMatchObject({ param: "customer" })
	expect((await stripe.paymentMethods.detach(method?.id ?? "")).customer).toBeNull()
	expect(await refusal(charge(stripe, customer, method?.id ?? ""))).toMatchObject({ param: "payment_method" })
})

test("a session that keeps a card wants the customer it is kept for, and sells nothing", async () => {
	const { stripe } = await startFake()
	const setup = { mode: "setup" as const, currency: "usd", success_url: "http://shop.example.test/kept" }
	expect(await refusal(stripe.checkout.sessions.create(setup))).toMatchObject({ param: "customer" })
	const selling = { ...sessionOf(2500), ...setup }
	expect(await refusal(stripe.checkout.sessions.create(selling))).toMatchObject({ statusCode: 400 })
})

test("the page of a payment offers what is kept for its customer", async () => {
	const { stripe } = await startFake()
	const customer = await customerOf(stripe)
	const method = await keep(stripe, customer, card("5555555555554444"))
	const { customer_email, ...rest } = sessionOf(2500)
	const session = await stripe.checkout.sessions.create({
		...rest,
		customer,
		saved_payment_method_options: { allow_redisplay_filters: ["always", "limited"] },
	})
	expect(await (await fetch(String(session.url))).text()).toContain("Pay $25.00 with the kept card ending in 4444")
	await postForm(session.url, { kept: method })
	const done = await stripe.checkout.sessions.retrieve(session.id, { expand: ["payment_intent"] })
	expect(done).toMatchObject({ payment_status: "paid", payment_intent: { payment_method: method } })
})
