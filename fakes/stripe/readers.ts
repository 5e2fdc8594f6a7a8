import type Stripe from "stripe"
import { z } from "zod"
import { invalidRequest, noSuch, unexpectedState } from "./errors"
import type { Cause } from "./events"
import type { Fake } from "./fake"
import { page } from "./lists"
import { expandable, flag, paging, paramsOf, readParams } from "./params"
import { attempt } from "./payment-flow"
import { getIntent } from "./payment-intents"
import type { Endpoints } from "./router"

const processSchema = paramsOf<Stripe.Terminal.ReaderProcessPaymentIntentParams>()({
	...expandable,
	payment_intent: z.string(),
	process_config: z
		.strictObject({ enable_customer_cancellation: flag.optional(), skip_tipping: flag.optional() })
		.optional(),
})
type PresentParams = Parameters<Stripe["testHelpers"]["terminal"]["readers"]["presentPaymentMethod"]>[1] & object

const presentSchema = paramsOf<PresentParams>()({
	...expandable,
	amount_tip: z.literal("0", "The payment fake knows no tips").optional(),
	type: z.literal("card_present", "The payment fake presents cards only").optional(),
	card_present: z.strictObject({ number: z.string() }).optional(),
})
// Readers are not listed by time.
const { created: _, ...undatedPaging } = paging

const listSchema = paramsOf<Stripe.Terminal.ReaderListParams>()({
	...undatedPaging,
	device_type: z.string().optional(),
	location: z.string().optional(),
	serial_number: z.string().optional(),
	status: z.enum(["offline", "online"]).optional(),
})

const troubles = {
	offline: {
		code: "terminal_reader_offline",
		message: "Reader is currently offline, please ensure the reader is powered on and connected to the internet.",
	},
	busy: { code: "terminal_reader_busy", message: "Reader is currently busy processing another request." },
	timeout: { code: "terminal_reader_timeout", message: "There was a timeout when sending this command to the reader." },
} as const

/** The reader named `id`; refuses with 404 `resource_missing`. */
function getReader(fake: Fake, id: string): Stripe.Terminal.Reader {
	const reader = fake.store.readers.get(id)
	if (!reader) throw noSuch("terminal.reader", id, "reader")
	return reader
}

function startAction(fake: Fake, reader: Stripe.Terminal.Reader, intent: Stripe.PaymentIntent): void {
	const trouble = fake.switches.readerTrouble[reader.id]
	if (trouble) throw invalidRequest(troubles[trouble].message, { code: troubles[trouble].code })
	if (!intent.payment_method_types.includes("card_present")) {
		throw invalidRequest("This PaymentIntent does not allow the payment method type card_present.", {
			code: "payment_intent_invalid_parameter",
			param: "payment_intent",
		})
	}
	if (intent.status !== "requires_payment_method") {
		throw unexpectedState(`This PaymentIntent cannot be processed in its status ${intent.status}.`, intent)
	}
	// A payment that nobody has presented a card for is replaced by the next one.
	reader.action = {
		api_error: null,
		failure_code: null,
		failure_message: null,
		process_payment_intent: { payment_intent: intent.id },
		status: "in_progress",
		type: "process_payment_intent",
	}
	reader.last_seen_at = fake.seconds() * 1000
}

/**
 * Presents a test card to a reader that waits for one: the payment succeeds (terminal.reader.action_succeeded) or is
 * declined (terminal.reader.action_failed, the payment open again), after the events of the payment itself.
 * Refuses when the reader waits for nothing, or the number is no test card.
 */
export function presentCard(fake: Fake, reader: Stripe.Terminal.Reader, number: string, cause: Cause): void {
	const waiting = reader.action?.status === "in_progress" ? reader.action.process_payment_intent : undefined
	if (!reader.action || !waiting) {
		throw invalidRequest("The reader does not wait for a card.", { code: "terminal_reader_no_action" })
	}
	const intent = getIntent(fake, String(waiting.payment_intent))
	if (intent.status !== "requires_payment_method") {
		throw unexpectedState(`This PaymentIntent cannot be processed in its status ${intent.status}.`, intent)
	}
	const year = new Date(fake.seconds() * 1000).getUTCFullYear() + 2
	const card = { number, expMonth: 12, expYear: year, name: null, email: null }
	const result = attempt(fake, intent, card, cause, { reader: reader.id })
	if (result.kind === "declined") {
		reader.action.status = "failed"
		reader.action.failure_code = result.code
		reader.action.failure_message = result.message
		reader.action.api_error = {
			type: "card_error",
			charge: result.charge,
			code: result.code,
			decline_code: result.declineCode,
			message: result.message,
		}
		fake.events.emit("terminal.reader.action_failed", reader, cause)
		return
	}
	reader.action.status = "succeeded"
	fake.events.emit("terminal.reader.action_succeeded", reader, cause)
}

export const readerEndpoints: Endpoints = {
	"GET /v1/terminal/readers": ({ fake, form }) => {
		const { device_type, location, serial_number, status, ...rest } = readParams(listSchema, form)
		// Newest first would put the second reader before the first one; Stripe's order is that of registration.
		const rows = [...fake.store.readers.values()]
			.filter(
				(row) =>
					(device_type === undefined || row.device_type === device_type) &&
					(location === undefined || row.location === location) &&
					(serial_number === undefined || row.serial_number === serial_number) &&
					(status === undefined || row.status === status),
			)
			.reverse()
		return page(rows, "/v1/terminal/readers", rest)
	},
	"GET /v1/terminal/readers/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		return getReader(fake, id)
	},
	"POST /v1/terminal/readers/:id/process_payment_intent": ({ fake, form, id }) => {
		const reader = getReader(fake, id)
		const given = readParams(processSchema, form)
		startAction(fake, reader, getIntent(fake, given.payment_intent, "payment_intent"))
		return reader
	},
	"POST /v1/terminal/readers/:id/cancel_action": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		const reader = getReader(fake, id)
		if (reader.action?.status === "in_progress") reader.action = null
		return reader
	},
	"POST /v1/test_helpers/terminal/readers/:id/present_payment_method": ({ fake, form, id, cause }) => {
		const given = readParams(presentSchema, form)
		const reader = getReader(fake, id)
		presentCard(fake, reader, given.card_present?.number ?? "4242424242424242", cause)
		return reader
	},
}
