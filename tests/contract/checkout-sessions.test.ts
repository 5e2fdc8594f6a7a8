import type Stripe from "stripe"
import { expect, test } from "vitest"
import { card, postForm, refusal, sessionOf, startFake, startFakeWithEndpoint } from "./harness"

test("a session is open, unpaid and without a payment intent until somebody tries to pay", async () => {
	const { stripe, fake } = await startFake()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	expect(session).toMatchObject({
		object: "checkout.session",
		status: "open",
		payment_status: "unpaid",
		amount_total: 2500,
		currency: "usd",
		client_reference_id: "inv_7",
		metadata: { invoice: "7" },
		payment_intent: null,
		customer_email: "books@corner.example.test",
	})
	expect(session.url).toBe(`${fake.url}/pay/${session.id}`)
	expect(session.expires_at - session.created).toBe(24 * 60 * 60)
	const lines = await stripe.checkout.sessions.listLineItems(session.id)
	expect(lines.data).toMatchObject([{ description: "Invoice 2026-0007", quantity: 1, amount_total: 2500 }])
})

test("the sum of several lines is the session's total, and lines are left out unless they are asked for", async () => {
	const { stripe } = await startFake()
	const line = (name: string, cents: number, quantity: number) => ({
		quantity,
		price_data: { currency: "usd", unit_amount: cents, product_data: { name } },
	})
	const params = { ...sessionOf(1), line_items: [line("Cut comb", 1250, 3), line("Postage", 799, 1)] }
	const { id } = await stripe.checkout.sessions.create(params)
	const plain = await stripe.checkout.sessions.retrieve(id)
	expect(plain.amount_total).toBe(4549)
	expect(plain).not.toHaveProperty("line_items")
	const full = await stripe.checkout.sessions.retrieve(id, { expand: ["line_items"] })
	expect(full.line_items?.data.map((row) => [row.description, row.amount_total])).toEqual([
		["Cut comb", 3750],
		["Postage", 799],
	])
})

test("a paid session answers its payment intent and charge when they are asked for", async () => {
	const { stripe } = await startFake()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	await postForm(session.url, card("4242424242424242"))
	const plain = await stripe.checkout.sessions.retrieve(session.id)
	expect(plain.payment_intent).toMatch(/^pi_/)
	const full = await stripe.checkout.sessions.retrieve(session.id, { expand: ["payment_intent.latest_charge"] })
	const intent = full.payment_intent as Stripe.PaymentIntent
	expect(intent).toMatchObject({ status: "succeeded", metadata: { invoice: "7", producer: "3" } })
	expect(intent.latest_charge).toMatchObject({ object: "charge", paid: true, amount: 2500 })
	const call = stripe.checkout.sessions.retrieve(session.id, { expand: ["nonsense"] })
	expect(await refusal(call)).toMatchObject({ message: "This property cannot be expanded (nonsense)." })
})

test("sessions are listed by status and by payment intent", async () => {
	const { stripe } = await startFake()
	const paid = await stripe.checkout.sessions.create(sessionOf(2500))
	const open = await stripe.checkout.sessions.create(sessionOf(900))
	await postForm(paid.url, card("4242424242424242"))
	const { payment_intent } = await stripe.checkout.sessions.retrieve(paid.id)
	const byStatus = await stripe.checkout.sessions.list({ status: "open" })
	expect(byStatus.data.map((row) => row.id)).toEqual([open.id])
	const byIntent = await stripe.checkout.sessions.list({ payment_intent: String(payment_intent) })
	expect(byIntent.data.map((row) => row.id)).toEqual([paid.id])
})

test("an expired session takes no payment and cannot be expired again", async () => {
	const { stripe, endpoint, fake } = await startFakeWithEndpoint()
	const session = await stripe.checkout.sessions.create(sessionOf(2500))
	const expired = await stripe.checkout.sessions.expire(session.id)
	expect(expired).toMatchObject({ status: "expired", payment_status: "unpaid", url: null })
	const tried = await postForm(session.url, card("4242424242424242"))
	expect(tried.status).toBe(410)
	expect(await tried.text()).toContain("The time for this payment is over")
	expect(fake.state.charges.size).toBe(0)
	expect(await refusal(stripe.checkout.sessions.expire(session.id))).toMatchObject({ statusCode: 400 })
	await fake.idle()
	expect(endpoint.types()).toEqual(["checkout.session.expired"])
})

test("a session expires by itself when its time comes, together with a payment begun under it", async () => {
	let now = Date.UTC(2026, 7, 18, 12)
	const { stripe, endpoint, fake } = await startFakeWithEndpoint(undefined, { now: () => now })
	const expires_at = now / 1000 + 30 * 60
	const session = await stripe.checkout.sessions.create({ ...sessionOf(2500), expires_at })
	await postForm(session.url, card("4000000000000002"))
	now += 30 * 60 * 1000
	const read = await stripe.checkout.sessions.retrieve(session.id, { expand: ["payment_intent"] })
	expect(read).toMatchObject({ status: "expired", payment_intent: { status: "canceled" } })
	await fake.idle()
	expect(endpoint.types().slice(-2)).toEqual(["payment_intent.canceled", "checkout.session.expired"])
})

test("a session that Stripe would refuse is refused", async () => {
	const { stripe } = await startFake()
	const soon = Math.floor(Date.now() / 1000) + 60
	const create = (changes: Partial<Stripe.Checkout.SessionCreateParams>) =>
		refusal(stripe.checkout.sessions.create({ ...sessionOf(2500), ...changes }))
	expect(await create({ expires_at: soon })).toMatchObject({ param: "expires_at" })
	expect(await create({ line_items: [] })).toMatchObject({ code: "parameter_missing", param: "line_items" })
	expect(await create({ line_items: sessionOf(10).line_items })).toMatchObject({ code: "amount_too_small" })
	expect(await create({ customer: "cus_nobody" })).toMatchObject({ code: "parameters_exclusive" })
	expect(await create({ customer: "cus_nobody", customer_email: undefined })).toMatchObject({ param: "customer" })
	expect(await create({ success_url: "not an address" })).toMatchObject({ param: "success_url" })
	expect(await create({ mode: "subscription" })).toMatchObject({ param: "mode" })
})
