import type Stripe from "stripe"
import { expect, test } from "vitest"
import { refusal, startFake, startFakeWithEndpoint } from "./harness"

const paid = (stripe: Stripe, cents: number) =>
	stripe.paymentIntents.create({ amount: cents, currency: "usd", confirm: true, payment_method: "pm_card_visa" })

test("a payment is given back in parts, never more than was taken", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const intent = await paid(stripe, 2500)
	const part = await stripe.refunds.create({
		payment_intent: intent.id,
		amount: 700,
		reason: "requested_by_customer",
		metadata: { credit: "12" },
	})
	expect(part).toMatchObject({ object: "refund", amount: 700, status: "succeeded", metadata: { credit: "12" } })
	const over = await refusal(stripe.refunds.create({ payment_intent: intent.id, amount: 1801 }))
	expect(over).toMatchObject({
		type: "StripeInvalidRequestError",
		statusCode: 400,
		param: "amount",
		message: "Refund amount ($18.01) is greater than unrefunded amount on charge ($18.00)",
	})
	const rest = await stripe.refunds.create({ payment_intent: intent.id })
	expect(rest.amount).toBe(1800)
	const more = stripe.refunds.create({ payment_intent: intent.id, amount: 1 })
	expect(await refusal(more)).toMatchObject({ code: "charge_already_refunded" })

	const charge = await stripe.charges.retrieve(String(intent.latest_charge), { expand: ["refunds"] })
	expect(charge).toMatchObject({ amount_refunded: 2500, refunded: true })
	expect(charge.refunds?.data.map((refund) => refund.amount)).toEqual([1800, 700])
	const list = await stripe.refunds.list({ payment_intent: intent.id })
	expect(list.data.map((refund) => refund.id)).toEqual([rest.id, part.id])
	expect(await stripe.refunds.retrieve(part.id)).toMatchObject({ id: part.id, charge: charge.id })
	await fake.idle()
	const twice = ["refund.created", "charge.refunded", "refund.created", "charge.refunded"]
	expect(endpoint.types().slice(3)).toEqual(twice)
})

test("a refund of a charge, of nothing, and of what was never paid", async () => {
	const { stripe } = await startFake()
	const intent = await paid(stripe, 2500)
	const charge = String(intent.latest_charge)
	const over = stripe.refunds.create({ charge, amount: 2501 })
	expect(await refusal(over)).toMatchObject({
		message: "Refund amount ($25.01) is greater than charge amount ($25.00)",
	})
	expect(await refusal(stripe.refunds.create({ charge, amount: 0 }))).toMatchObject({ param: "amount" })
	expect((await stripe.refunds.create({ charge })).amount).toBe(2500)
	const open = await stripe.paymentIntents.create({ amount: 2500, currency: "usd" })
	expect(await refusal(stripe.refunds.create({ payment_intent: open.id }))).toMatchObject({ statusCode: 400 })
	expect(await refusal(stripe.refunds.create({}))).toMatchObject({ statusCode: 400 })
})
