import type Stripe from "stripe"
import { expect, test } from "vitest"
import { refusal, startFake, startFakeWithEndpoint } from "./harness"

const paid = (stripe: Stripe, cents: number) =>
	stripe.paymentIntents.create({ amount: cents, currency: "usd", confirm: true, payment_method: "pm_card_visa" })

test("a charge brings what it took less the fee", async () => {
	const { stripe } = await startFake()
	const intent = await paid(stripe, 10_000)
	const charge = await stripe.charges.retrieve(String(intent.latest_charge), { expand: ["balance_transaction"] })
	// Stripe's list price for a card in the United States, from memory: 2.9 % and 30 cents.
	expect(charge.balance_transaction).toMatchObject({ amount: 10_000, fee: 320, net: 9680, type: "charge" })
})

test("a payout takes charges and refunds since the last, and lists what it is made of", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const first = await paid(stripe, 10_000)
	const refund = await stripe.refunds.create({ payment_intent: first.id, amount: 1000 })
	fake.bank({ step: "pay-out" })
	const [payout] = (await stripe.payouts.list()).data
	expect(payout).toMatchObject({ object: "payout", amount: 8680, status: "paid" })
	const parts = await stripe.balanceTransactions.list({ payout: payout?.id ?? "", expand: ["data.source"] })
	expect(parts.data.map(({ net, type }) => [type, net])).toEqual([
		["refund", -1000],
		["charge", 9680],
	])
	expect(parts.data.map(({ source }) => (source as { id: string }).id)).toEqual([
		refund.id,
		String(first.latest_charge),
	])
	await paid(stripe, 5000)
	fake.bank({ step: "pay-out" })
	expect((await stripe.payouts.list()).data.map(({ amount }) => amount)).toEqual([4825, 8680])
	fake.bank({ step: "pay-out" })
	expect((await stripe.payouts.list()).data).toHaveLength(2)
	await fake.idle()
	expect(endpoint.types().filter((type) => type === "payout.paid")).toHaveLength(2)
})

test("a dispute withdraws the money with a fee, and a won one gives it back", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const intent = await paid(stripe, 10_000)
	const charge = String(intent.latest_charge)
	fake.bank({ step: "open-dispute", charge })
	const [dispute] = (await stripe.disputes.list({ payment_intent: intent.id })).data
	expect(dispute).toMatchObject({
		status: "needs_response",
		amount: 10_000,
		balance_transactions: [{ amount: -10_000, fee: 1500, net: -11_500 }],
	})
	expect((await stripe.charges.retrieve(charge)).disputed).toBe(true)
	fake.bank({ step: "close-dispute", dispute: dispute?.id ?? "", outcome: "won" })
	const decided = await stripe.disputes.retrieve(dispute?.id ?? "")
	expect(decided).toMatchObject({ status: "won", balance_transactions: [{ net: -11_500 }, { net: 11_500 }] })
	expect(() => fake.bank({ step: "open-dispute", charge })).toThrow("cannot be disputed")
	await fake.idle()
	expect(endpoint.types().slice(3)).toEqual([
		"charge.dispute.created",
		"charge.dispute.funds_withdrawn",
		"charge.dispute.funds_reinstated",
		"charge.dispute.closed",
	])
})

test("a refund may fail after it was made, and can then be made anew", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const intent = await paid(stripe, 10_000)
	const refund = await stripe.refunds.create({ payment_intent: intent.id })
	expect(await refusal(stripe.refunds.create({ payment_intent: intent.id }))).toMatchObject({
		code: "charge_already_refunded",
	})
	fake.bank({ step: "settle-refund", refund: refund.id, outcome: "failed" })
	expect(await stripe.refunds.retrieve(refund.id)).toMatchObject({
		status: "failed",
		failure_reason: expect.any(String),
	})
	expect((await stripe.refunds.create({ payment_intent: intent.id })).status).toBe("succeeded")
	await fake.idle()
	expect(endpoint.types()).toContain("refund.failed")
})
