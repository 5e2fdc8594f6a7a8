import type Stripe from "stripe"
import { expect, test } from "vitest"
import { postForm, refusal, startFake, startFakeWithEndpoint } from "./harness"

test("an intent is created, confirmed with a test card, and answers its charge", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const intent = await stripe.paymentIntents.create({ amount: 1250, currency: "USD", metadata: { sale: "9" } })
	expect(intent).toMatchObject({ status: "requires_payment_method", currency: "usd", latest_charge: null })
	expect(intent.client_secret).toMatch(new RegExp(`^${intent.id}_secret_`))
	const paid = await stripe.paymentIntents.confirm(intent.id, {
		payment_method: "pm_card_visa",
		expand: ["latest_charge"],
	})
	expect(paid).toMatchObject({ status: "succeeded", amount_received: 1250 })
	expect(paid.latest_charge).toMatchObject({ status: "succeeded", metadata: { sale: "9" } })
	await fake.idle()
	expect(endpoint.types()).toEqual(["payment_intent.created", "charge.succeeded", "payment_intent.succeeded"])
	const again = stripe.paymentIntents.confirm(intent.id, { payment_method: "pm_card_visa" })
	expect(await refusal(again)).toMatchObject({ code: "payment_intent_unexpected_state" })
})

test("a declined card is a card error that carries the intent, which stays payable", async () => {
	const { stripe } = await startFake()
	const intent = await stripe.paymentIntents.create({ amount: 1250, currency: "usd" })
	const error = await refusal(stripe.paymentIntents.confirm(intent.id, { payment_method: "pm_card_chargeDeclined" }))
	expect(error).toMatchObject({
		type: "StripeCardError",
		statusCode: 402,
		code: "card_declined",
		decline_code: "generic_decline",
		payment_intent: { id: intent.id, status: "requires_payment_method" },
	})
	const paid = await stripe.paymentIntents.confirm(intent.id, { payment_method: "pm_card_visa" })
	expect(paid.status).toBe("succeeded")
	const charges = await stripe.charges.list({ payment_intent: intent.id })
	expect(charges.data.map((charge) => charge.status)).toEqual(["succeeded", "failed"])
	expect((await stripe.charges.retrieve(String(paid.latest_charge))).paid).toBe(true)
})

test("a card that asks for approval waits for its holder, who is then led back", async () => {
	const { stripe } = await startFake()
	const intent = await stripe.paymentIntents.create({
		amount: 1250,
		currency: "usd",
		confirm: true,
		payment_method: "pm_card_authenticationRequired",
		return_url: "http://shop.example.test/back",
	})
	expect(intent.status).toBe("requires_action")
	const answer = await postForm(intent.next_action?.redirect_to_url?.url ?? null, { answer: "approve" })
	expect(answer.headers.get("location")).toBe("http://shop.example.test/back")
	expect((await stripe.paymentIntents.retrieve(intent.id)).status).toBe("succeeded")
})

test("an intent with manual capture is held, then captured once, whole or in part", async () => {
	const { stripe } = await startFake()
	const held = await stripe.paymentIntents.create({
		amount: 1250,
		currency: "usd",
		capture_method: "manual",
		confirm: true,
		payment_method: "pm_card_visa",
	})
	expect(held).toMatchObject({ status: "requires_capture", amount_capturable: 1250, amount_received: 0 })
	const tooMuch = stripe.paymentIntents.capture(held.id, { amount_to_capture: 1251 })
	expect(await refusal(tooMuch)).toMatchObject({ code: "amount_too_large" })
	const captured = await stripe.paymentIntents.capture(held.id, { amount_to_capture: 1000 })
	expect(captured).toMatchObject({ status: "succeeded", amount_received: 1000, amount_capturable: 0 })
	expect(await refusal(stripe.paymentIntents.capture(held.id))).toMatchObject({
		code: "payment_intent_unexpected_state",
	})
})

test("an open intent can be canceled, a paid one cannot", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const open = await stripe.paymentIntents.create({ amount: 1250, currency: "usd" })
	const canceled = await stripe.paymentIntents.cancel(open.id, { cancellation_reason: "abandoned" })
	expect(canceled).toMatchObject({ status: "canceled", cancellation_reason: "abandoned" })
	await fake.idle()
	expect(endpoint.types()).toEqual(["payment_intent.created", "payment_intent.canceled"])
	const paid = await stripe.paymentIntents.create({
		amount: 1250,
		currency: "usd",
		confirm: true,
		payment_method: "pm_card_visa",
	})
	expect(await refusal(stripe.paymentIntents.cancel(paid.id))).toMatchObject({
		code: "payment_intent_unexpected_state",
	})
})

test("intents are changed, and listed by customer", async () => {
	const { stripe } = await startFake()
	const customer = await stripe.customers.create({ name: "Corner Store" })
	const create: Stripe.PaymentIntentCreateParams = { amount: 1250, currency: "usd" }
	const own = await stripe.paymentIntents.create({ ...create, customer: customer.id })
	await stripe.paymentIntents.create(create)
	const changed = await stripe.paymentIntents.update(own.id, { metadata: { order: "4" } })
	expect(changed.metadata).toEqual({ order: "4" })
	const list = await stripe.paymentIntents.list({ customer: customer.id, expand: ["data.customer"] })
	expect(list.data.map((row) => row.customer)).toMatchObject([{ id: customer.id, name: "Corner Store" }])
	const unknown = stripe.paymentIntents.create({ ...create, confirm: true, payment_method: "pm_real" })
	expect(await refusal(unknown)).toMatchObject({ param: "payment_method" })
	expect((await stripe.paymentIntents.list()).data).toHaveLength(2)
})
