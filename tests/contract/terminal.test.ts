import type Stripe from "stripe"
import { expect, test } from "vitest"
import { postForm, refusal, startFake, startFakeWithEndpoint } from "./harness"

const READER = "tmr_demo_stall"
const sale = (stripe: Stripe, changes: Partial<Stripe.PaymentIntentCreateParams> = {}) =>
	stripe.paymentIntents.create({
		amount: 2400,
		currency: "usd",
		allowed_payment_method_types: ["card_present"],
		...changes,
	})

test("the two readers of the demo are there", async () => {
	const { stripe } = await startFake()
	const { data } = await stripe.terminal.readers.list()
	expect(data.map((reader) => [reader.id, reader.label, reader.status])).toEqual([
		["tmr_demo_stall", "Stall reader", "online"],
		["tmr_demo_stall_2", "Second stall reader", "online"],
	])
	expect((await stripe.terminal.readers.list({ status: "offline" })).data).toEqual([])
})

test("a good card at the reader pays, and the reader tells of it last", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const intent = await sale(stripe)
	const waiting = await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	expect(waiting.action).toMatchObject({
		type: "process_payment_intent",
		status: "in_progress",
		process_payment_intent: { payment_intent: intent.id },
	})
	const done = await stripe.testHelpers.terminal.readers.presentPaymentMethod(READER)
	expect(done.action).toMatchObject({ status: "succeeded", failure_code: null })
	const paid = await stripe.paymentIntents.retrieve(intent.id, { expand: ["latest_charge"] })
	expect(paid).toMatchObject({
		status: "succeeded",
		latest_charge: {
			payment_method_details: { type: "card_present", card_present: { last4: "4242", reader: READER } },
		},
	})
	await fake.idle()
	expect(endpoint.types()).toEqual([
		"payment_intent.created",
		"charge.succeeded",
		"payment_intent.succeeded",
		"terminal.reader.action_succeeded",
	])
})

test("a declined card fails the action in words and leaves the sale open for another card", async () => {
	const { stripe, fake, endpoint } = await startFakeWithEndpoint()
	const intent = await sale(stripe)
	const { readers } = stripe.testHelpers.terminal
	const number = "4000000000000002"
	await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	const failed = await readers.presentPaymentMethod(READER, { type: "card_present", card_present: { number } })
	expect(failed.action).toMatchObject({
		status: "failed",
		failure_code: "card_declined",
		failure_message: "Your card was declined.",
		api_error: { type: "card_error", decline_code: "generic_decline" },
	})
	expect((await stripe.paymentIntents.retrieve(intent.id)).status).toBe("requires_payment_method")
	await fake.idle()
	expect(endpoint.types()).toEqual([
		"payment_intent.created",
		"charge.failed",
		"payment_intent.payment_failed",
		"terminal.reader.action_failed",
	])
	await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	await readers.presentPaymentMethod(READER)
	expect((await stripe.paymentIntents.retrieve(intent.id)).status).toBe("succeeded")
})

test("with manual capture the reader only holds the money", async () => {
	const { stripe } = await startFake()
	const intent = await sale(stripe, { capture_method: "manual" })
	await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	await stripe.testHelpers.terminal.readers.presentPaymentMethod(READER)
	expect((await stripe.paymentIntents.retrieve(intent.id)).status).toBe("requires_capture")
	expect((await stripe.paymentIntents.capture(intent.id)).status).toBe("succeeded")
})

test("a canceled action takes no card", async () => {
	const { stripe, fake } = await startFake()
	const intent = await sale(stripe)
	await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	expect(await stripe.terminal.readers.cancelAction(READER)).toMatchObject({ id: READER, action: null })
	expect(await refusal(stripe.testHelpers.terminal.readers.presentPaymentMethod(READER))).toMatchObject({
		statusCode: 400,
	})
	expect(fake.state.charges.size).toBe(0)
	expect(await stripe.terminal.readers.retrieve(READER)).toMatchObject({ id: READER, action: null })
})

test("a reader takes no payment that is paid, canceled, or not meant for a reader", async () => {
	const { stripe } = await startFake()
	const process = (id: string) => refusal(stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: id }))
	const online = await stripe.paymentIntents.create({ amount: 2400, currency: "usd" })
	expect(await process(online.id)).toMatchObject({ code: "payment_intent_invalid_parameter" })
	const canceled = await sale(stripe)
	await stripe.paymentIntents.cancel(canceled.id)
	expect(await process(canceled.id)).toMatchObject({ code: "payment_intent_unexpected_state" })
	expect(await process("pi_nothing")).toMatchObject({ code: "resource_missing", param: "payment_intent" })
})

test("an intent canceled while the reader waits is not charged by a card presented later", async () => {
	const { stripe, fake } = await startFake()
	const intent = await sale(stripe)
	await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	await stripe.paymentIntents.cancel(intent.id)
	const late = stripe.testHelpers.terminal.readers.presentPaymentMethod(READER)
	expect(await refusal(late)).toMatchObject({ code: "payment_intent_unexpected_state" })
	expect(fake.state.charges.size).toBe(0)
})

test.each([
	["offline", "terminal_reader_offline"],
	["busy", "terminal_reader_busy"],
	["timeout", "terminal_reader_timeout"],
] as const)("a reader that is %s refuses the payment, the other one takes it", async (trouble, code) => {
	const { stripe, fake } = await startFake()
	fake.switch({ readerTrouble: { [READER]: trouble } })
	const intent = await sale(stripe)
	const call = stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	expect(await refusal(call)).toMatchObject({ code, statusCode: 400 })
	const other = await stripe.terminal.readers.processPaymentIntent("tmr_demo_stall_2", { payment_intent: intent.id })
	expect(other.action?.status).toBe("in_progress")
})

test("a person presents a card on the readers' page, declined first and good after", async () => {
	const { stripe, fake } = await startFake()
	const intent = await sale(stripe)
	const read = async () => (await fetch(`${fake.url}/readers`)).text()
	const present = (word: string) => postForm(`${fake.url}/readers/${READER}/present`, { card: word })
	expect(await read()).toContain("Ready. Nothing to pay.")
	expect(await read()).not.toContain("<button")
	expect((await present("good")).status).toBe(400)

	await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	expect(await read()).toContain("Waits for a card: $24.00")
	const declined = await present("declined")
	expect(declined.status).toBe(303)
	expect(declined.headers.get("location")).toBe("/readers")
	expect(await read()).toContain("declined. Your card was declined.")

	await stripe.terminal.readers.processPaymentIntent(READER, { payment_intent: intent.id })
	await present("good")
	expect(await read()).toContain("Last payment: $24.00, approved.")
	expect((await stripe.paymentIntents.retrieve(intent.id)).status).toBe("succeeded")
})
