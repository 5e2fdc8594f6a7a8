import type Stripe from "stripe"
import { expect, test } from "vitest"
import { card, postForm, sessionOf, startFake, startFakeWithEndpoint } from "./harness"

const readSession = (stripe: Stripe, id: string) =>
	stripe.checkout.sessions.retrieve(id, { expand: ["payment_intent.latest_charge"] })

test("the page says that no money moves, and shows the sum, the lines and a form that needs no script", async () => {
	const { stripe } = await startFake()
	const params = sessionOf(2500)
	const line = {
		quantity: 2,
		price_data: { currency: "usd", unit_amount: 100, product_data: { name: "<b>Comb & co</b>" } },
	}
	const session = await stripe.checkout.sessions.create({ ...params, line_items: [...(params.line_items ?? []), line] })
	const page = await fetch(String(session.url))
	const html = await page.text()
	expect(page.status).toBe(200)
	expect(html).toContain("Test payments – no money moves")
	expect(html).toContain("$27.00")
	expect(html).toContain("Invoice 2026-0007")
	expect(html).toContain("&lt;b&gt;Comb &amp; co&lt;/b&gt;")
	expect(html).not.toContain("<script")
	for (const field of ["number", "expiry", "cvc", "name"]) expect(html).toContain(`<label for="${field}">`)
	expect(html).toContain('href="http://shop.example.test/invoice/7"')
})

test("a good card pays: the payer is sent back, and three events tell of it in order", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	const answer = await postForm(session.url, card("4242 4242 4242 4242"))
	expect(answer.status).toBe(303)
	expect(answer.headers.get("location")).toBe(`http://shop.example.test/paid?session=${session.id}`)
	const paid = await readSession(stripe, session.id)
	expect(paid).toMatchObject({
		status: "complete",
		payment_status: "paid",
		url: null,
		customer_details: { email: "books@corner.example.test", name: "Robin Vale" },
		payment_intent: {
			status: "succeeded",
			amount_received: 2500,
			latest_charge: { payment_method_details: { type: "card", card: { brand: "visa", last4: "4242" } } },
		},
	})
	await fake.idle()
	expect(endpoint.types()).toEqual([
		"payment_intent.created",
		"charge.succeeded",
		"payment_intent.succeeded",
		"checkout.session.completed",
	])
	expect(endpoint.received[3]?.event.data.object).toMatchObject({ id: session.id, payment_status: "paid" })
})

test.each([
	["4000000000000002", "Your card was declined.", "generic_decline"],
	["4000000000009995", "Your card has insufficient funds.", "insufficient_funds"],
])("card %s is declined in words and the page stays open", async (number, sentence, declineCode) => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	const answer = await postForm(session.url, card(number))
	expect(answer.status).toBe(402)
	const html = await answer.text()
	expect(html).toContain(sentence)
	expect(html).toContain("<form")
	expect(html).not.toContain(number)
	expect(await readSession(stripe, session.id)).toMatchObject({
		status: "open",
		payment_status: "unpaid",
		payment_intent: {
			status: "requires_payment_method",
			last_payment_error: { code: "card_declined", decline_code: declineCode, message: sentence },
		},
	})
	await fake.idle()
	expect(endpoint.types()).toEqual(["payment_intent.created", "charge.failed", "payment_intent.payment_failed"])

	const second = await postForm(session.url, card("4242424242424242"))
	expect(second.status).toBe(303)
	expect(fake.state.intents.size).toBe(1)
	expect(await readSession(stripe, session.id)).toMatchObject({
		payment_status: "paid",
		payment_intent: { status: "succeeded", last_payment_error: null },
	})
})

test("a card that asks for approval leads to a second page; approving pays", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	const asked = await postForm(session.url, card("4000002760003184"))
	expect(asked.status).toBe(303)
	const where = asked.headers.get("location")
	const html = await (await fetch(String(where))).text()
	expect(html).toContain("Approve</button>")
	expect(html).toContain("Refuse</button>")
	expect((await readSession(stripe, session.id)).payment_intent).toMatchObject({
		status: "requires_action",
		next_action: { type: "redirect_to_url", redirect_to_url: { url: where } },
	})
	const approved = await postForm(where, { answer: "approve" })
	expect(approved.headers.get("location")).toBe(`http://shop.example.test/paid?session=${session.id}`)
	expect(await readSession(stripe, session.id)).toMatchObject({
		payment_status: "paid",
		payment_intent: { latest_charge: { payment_method_details: { card: { last4: "3184" } } } },
	})
	expect((await postForm(where, { answer: "approve" })).status).toBe(404)
	await fake.idle()
	expect(endpoint.types()).toEqual([
		"payment_intent.created",
		"payment_intent.requires_action",
		"charge.succeeded",
		"payment_intent.succeeded",
		"checkout.session.completed",
	])
})

test("refusing the approval leads back to the form with a sentence, and nothing is charged", async () => {
	const { stripe, fake } = await startFake()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	const asked = await postForm(session.url, card("4000002760003184"))
	const refused = await postForm(asked.headers.get("location"), { answer: "refuse" })
	expect(refused.status).toBe(303)
	const back = await fetch(new URL(String(refused.headers.get("location")), fake.url))
	expect(await back.text()).toContain("We are unable to authenticate your payment method")
	expect(fake.state.charges.size).toBe(0)
	expect(await readSession(stripe, session.id)).toMatchObject({
		status: "open",
		payment_intent: {
			status: "requires_payment_method",
			last_payment_error: { code: "payment_intent_authentication_failure" },
		},
	})
})

test("a form with mistakes says what is wrong at each field and tries nothing", async () => {
	const { stripe, fake } = await startFake()
	const session = await stripe.checkout.sessions.create({ ...sessionOf(2500), customer_email: undefined })
	const answer = await postForm(session.url, {
		number: "4111111111111111",
		expiry: "13/34",
		cvc: "1",
		name: "",
		email: "x",
	})
	const html = await answer.text()
	expect(answer.status).toBe(422)
	expect(html).toContain("This is not one of the test cards.")
	expect(html).toContain("Enter the expiry as month and year")
	expect(html).toContain("Enter the three or four digits")
	expect(html).toContain("Enter the name on the card.")
	expect(html).toContain("Enter an e-mail address.")
	expect(html).toContain('aria-invalid="true"')
	expect(html).not.toContain("4111111111111111")
	const old = await postForm(session.url, {
		...card("4242424242424242"),
		expiry: "01/20",
		email: "robin@vale.example.test",
	})
	expect(await old.text()).toContain("This expiry date is in the past.")
	expect(fake.state.intents.size).toBe(0)

	await postForm(session.url, { ...card("4242424242424242"), email: "robin@vale.example.test" })
	expect((await readSession(stripe, session.id)).customer_details?.email).toBe("robin@vale.example.test")
})

test("posting the form twice charges once and leads to the same place", async () => {
	const { stripe, fake } = await startFake()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	const both = await Promise.all([1, 2].map(() => postForm(session.url, card("4242424242424242"))))
	expect(both.map((answer) => answer.headers.get("location"))).toEqual(
		Array(2).fill(`http://shop.example.test/paid?session=${session.id}`),
	)
	expect(fake.state.charges.size).toBe(1)
	expect(await (await fetch(String(session.url))).text()).toContain("This payment has been made.")
})

test("a customer's own address is used, and the payment belongs to the customer", async () => {
	const { stripe } = await startFake()
	const customer = await stripe.customers.create({ email: "books@corner.example.test" })
	const params = { ...sessionOf(2500), customer: customer.id, customer_email: undefined }
	const session = await stripe.checkout.sessions.create(params)
	await postForm(session.url, card("5555555555554444"))
	expect(await readSession(stripe, session.id)).toMatchObject({
		customer: customer.id,
		customer_details: { email: "books@corner.example.test" },
		payment_intent: { customer: customer.id, latest_charge: { customer: customer.id } },
	})
})

test("a page that does not exist answers 404", async () => {
	const { fake } = await startFake()
	for (const path of ["/pay/cs_test_nothing", "/authenticate/pi_nothing", "/elsewhere"]) {
		expect((await fetch(`${fake.url}${path}`)).status).toBe(404)
	}
})
