import { expect, test } from "vitest"
import { refusal, startFake } from "./harness"

const payment = { amount: 1250, currency: "usd", confirm: true, payment_method: "pm_card_visa" }

test("the same key and body give the same answer and one charge", async () => {
	const { stripe, fake } = await startFake()
	const first = await stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	const second = await stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	expect(second).toEqual(first)
	expect(second.lastResponse.headers["idempotent-replayed"]).toBe("true")
	expect(second.lastResponse.headers["original-request"]).toBe(first.lastResponse.requestId)
	expect(fake.state.charges.size).toBe(1)
})

test("the same key with another body, or at another address, is refused", async () => {
	const { stripe, fake } = await startFake()
	await stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	const other = stripe.paymentIntents.create({ ...payment, amount: 1300 }, { idempotencyKey: "sale-1" })
	expect(await refusal(other)).toMatchObject({
		type: "StripeIdempotencyError",
		rawType: "idempotency_error",
		statusCode: 400,
	})
	const elsewhere = stripe.customers.create({}, { idempotencyKey: "sale-1" })
	expect(await refusal(elsewhere)).toMatchObject({ type: "StripeIdempotencyError" })
	expect(fake.state.charges.size).toBe(1)
})

test("the same key twice at once: one goes through, the other is told to wait", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ slowMs: 300 })
	const call = () => stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1", maxNetworkRetries: 0 })
	const both = await Promise.allSettled([call(), call()])
	expect(both.map((one) => one.status).sort()).toEqual(["fulfilled", "rejected"])
	expect(both.find((one) => one.status === "rejected")?.reason).toMatchObject({
		statusCode: 409,
		code: "idempotency_key_in_use",
	})
	expect(fake.state.charges.size).toBe(1)
})

test("the same key twice at once with retries: both get the one payment", async () => {
	const { stripe, fake } = await startFake()
	fake.switch({ slowMs: 200 })
	const call = () => stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	const [first, second] = await Promise.all([call(), call()])
	expect(second.id).toBe(first.id)
	expect(fake.state.charges.size).toBe(1)
})

test("a decline is remembered under its key; a refused parameter is not and can be mended", async () => {
	const { stripe, fake } = await startFake()
	const declined = { ...payment, payment_method: "pm_card_chargeDeclined" }
	for (let n = 0; n < 2; n += 1) {
		const call = stripe.paymentIntents.create(declined, { idempotencyKey: "sale-1" })
		expect(await refusal(call)).toMatchObject({ code: "card_declined" })
	}
	expect(fake.state.charges.size).toBe(1)
	const tooSmall = stripe.paymentIntents.create({ ...payment, amount: 10 }, { idempotencyKey: "sale-2" })
	expect(await refusal(tooSmall)).toMatchObject({ code: "amount_too_small" })
	const mended = await stripe.paymentIntents.create(payment, { idempotencyKey: "sale-2" })
	expect(mended.status).toBe("succeeded")
})

test("a key is forgotten after a day", async () => {
	let now = Date.now()
	const { stripe } = await startFake({ now: () => now })
	const first = await stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	now += 24 * 60 * 60 * 1000
	const second = await stripe.paymentIntents.create(payment, { idempotencyKey: "sale-1" })
	expect(second.id).not.toBe(first.id)
})
