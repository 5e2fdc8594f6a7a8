import type Stripe from "stripe"
import { expect, test } from "vitest"
import { postForm, sessionOf, startFake, startFakeWithEndpoint } from "./harness"

const account = (number: string) => ({ routing: "110000000", account: number, name: "Corner Store" })

const byDebit = (cents: number): Stripe.Checkout.SessionCreateParams => ({
	...sessionOf(cents),
	allowed_payment_method_types: ["us_bank_account"],
})

const GOOD = "000123456789"
const EMPTY = "000222222227"

test("a debit is on its way until the bank lets it clear", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const session = await stripe.checkout.sessions.create(byDebit(20_000))
	const posted = await postForm(session.url, account(GOOD))
	expect(posted.headers.get("location")).toBe(`http://shop.example.test/paid?session=${session.id}`)
	const started = await stripe.checkout.sessions.retrieve(session.id, { expand: ["payment_intent.latest_charge"] })
	expect(started).toMatchObject({
		status: "complete",
		payment_status: "unpaid",
		payment_intent: {
			status: "processing",
			amount_received: 0,
			metadata: { invoice: "7" },
			latest_charge: {
				status: "pending",
				balance_transaction: null,
				payment_method_details: { type: "us_bank_account", us_bank_account: { last4: "6789" } },
			},
		},
	})
	const intent = (started.payment_intent as Stripe.PaymentIntent).id
	fake.bank({ step: "settle-debit", intent })
	expect(await stripe.paymentIntents.retrieve(intent)).toMatchObject({ status: "succeeded", amount_received: 20_000 })
	expect((await stripe.checkout.sessions.retrieve(session.id)).payment_status).toBe("paid")
	await fake.idle()
	expect(endpoint.types()).toEqual([
		"payment_intent.created",
		"charge.pending",
		"payment_intent.processing",
		"checkout.session.completed",
		"charge.succeeded",
		"payment_intent.succeeded",
		"checkout.session.async_payment_succeeded",
	])
	expect(() => fake.bank({ step: "settle-debit", intent })).toThrow("is not on its way")
})

test("a debit of an empty account comes back with the bank's reason", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const session = await stripe.checkout.sessions.create(byDebit(20_000))
	await postForm(session.url, account(EMPTY))
	const intent = String((await stripe.checkout.sessions.retrieve(session.id)).payment_intent)
	fake.bank({ step: "settle-debit", intent })
	expect(await stripe.paymentIntents.retrieve(intent, { expand: ["latest_charge"] })).toMatchObject({
		status: "requires_payment_method",
		last_payment_error: { code: "insufficient_funds", message: expect.stringContaining("insufficient funds") },
		latest_charge: { status: "failed", paid: false, failure_code: "insufficient_funds" },
	})
	await fake.idle()
	expect(endpoint.types().slice(-3)).toEqual([
		"charge.failed",
		"payment_intent.payment_failed",
		"checkout.session.async_payment_failed",
	])
})

test("a debit that is returned after it cleared is a dispute, lost from the start", async () => {
	const { stripe, fake } = await startFake()
	const session = await stripe.checkout.sessions.create(byDebit(20_000))
	await postForm(session.url, account(GOOD))
	const intent = String((await stripe.checkout.sessions.retrieve(session.id)).payment_intent)
	fake.bank({ step: "settle-debit", intent, outcome: "clear" })
	const charge = String((await stripe.paymentIntents.retrieve(intent)).latest_charge)
	fake.bank({ step: "open-dispute", charge, reason: "insufficient_funds" })
	const { data } = await stripe.disputes.list({ payment_intent: intent })
	expect(data).toMatchObject([{ status: "lost", amount: 20_000, reason: "insufficient_funds", charge }])
})

test("the page of a debit says what is wrong and writes no number back", async () => {
	const { stripe, fake } = await startFake()
	const session = await stripe.checkout.sessions.create(byDebit(5000))
	const refused = await postForm(session.url, account("987654321"))
	const html = await refused.text()
	expect(refused.status).toBe(422)
	expect(html).toContain("This is not one of the test accounts.")
	expect(html).not.toContain("987654321")
	await postForm(session.url, account(GOOD))
	expect(JSON.stringify(await (await fetch(`${fake.url}/_state`)).json())).not.toContain(GOOD)
})

test("a person lets a debit clear on the bank's page", async () => {
	const { stripe, fake } = await startFake()
	const session = await stripe.checkout.sessions.create(byDebit(5000))
	await postForm(session.url, account(GOOD))
	const intent = String((await stripe.checkout.sessions.retrieve(session.id)).payment_intent)
	expect(await (await fetch(`${fake.url}/bank`)).text()).toContain("Let it clear")
	await postForm(`${fake.url}/bank`, { step: "settle-debit", intent, outcome: "clear" })
	expect((await stripe.paymentIntents.retrieve(intent)).status).toBe("succeeded")
})
