import type Stripe from "stripe"
import { z } from "zod"
import { checkAmount } from "./amounts"
import { recordBalance } from "./balance"
import { numberOfMethod } from "./cards"
import { getCharge } from "./charges"
import { getCustomer } from "./customers"
import { startDebit } from "./debits"
import { invalidRequest, noSuch, StripeRefusal, unexpectedState } from "./errors"
import type { Cause } from "./events"
import type { Fake } from "./fake"
import { page } from "./lists"
import {
	clearable,
	currency,
	expandable,
	flag,
	integer,
	list,
	mergeMetadata,
	metadata,
	paging,
	paramsOf,
	readParams,
} from "./params"
import { type Attempt, attempt, chargeCard, openIntent } from "./payment-flow"
import { keptMethod } from "./payment-methods"
import type { Endpoints } from "./router"

const confirmFields = { payment_method: z.string().optional(), return_url: z.string().optional() }
const createSchema = paramsOf<Stripe.PaymentIntentCreateParams>()({
	...expandable,
	...confirmFields,
	allowed_payment_method_types: list(z.enum(["card", "card_present", "us_bank_account"])).optional(),
	amount: integer,
	currency,
	automatic_payment_methods: z
		.strictObject({ enabled: flag, allow_redirects: z.enum(["always", "never"]).optional() })
		.optional(),
	capture_method: z.enum(["automatic", "manual"]).optional(),
	confirm: flag.optional(),
	customer: z.string().optional(),
	description: z.string().optional(),
	metadata: metadata.optional(),
	off_session: flag.optional(),
	receipt_email: z.string().optional(),
})
const updateSchema = paramsOf<Stripe.PaymentIntentUpdateParams>()({
	...expandable,
	description: clearable.optional(),
	metadata: metadata.optional(),
	receipt_email: clearable.optional(),
})
const confirmSchema = paramsOf<Stripe.PaymentIntentConfirmParams>()({ ...expandable, ...confirmFields })
const captureSchema = paramsOf<Stripe.PaymentIntentCaptureParams>()({
	...expandable,
	amount_to_capture: integer.optional(),
})
const cancelSchema = paramsOf<Stripe.PaymentIntentCancelParams>()({
	...expandable,
	cancellation_reason: z.enum(["abandoned", "duplicate", "fraudulent", "requested_by_customer"]).optional(),
})
const listSchema = paramsOf<Stripe.PaymentIntentListParams>()({ ...paging, customer: z.string().optional() })
const retrieveSchema = paramsOf<Stripe.PaymentIntentRetrieveParams>()({
	...expandable,
	client_secret: z.string().optional(),
})

/** The payment intent named `id`; refuses with 404 `resource_missing`. */
export function getIntent(fake: Fake, id: string, param = "intent"): Stripe.PaymentIntent {
	const intent = fake.store.intents.get(id)
	if (!intent) throw noSuch("payment_intent", id, param)
	return intent
}

/** The number of the test card that a method such as `pm_card_visa` stands for. Refuses none and any other. */
function cardBehind(method: string | undefined): string {
	if (method === undefined) {
		throw invalidRequest("You cannot confirm this PaymentIntent because it's missing a payment method.", {
			code: "payment_intent_unexpected_state",
		})
	}
	const number = numberOfMethod(method)
	if (!number) throw noSuch("PaymentMethod", method, "payment_method")
	return number
}

type Confirmation = {
	payment_method?: string | undefined
	return_url?: string | undefined
	off_session?: boolean | undefined
}

/** Charges a method that is kept for the intent's customer. A debit is on its way afterwards, which counts as no refusal. */
function chargeKept(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	given: Confirmation & { payment_method: string },
	cause: Cause,
): Attempt {
	const customer = typeof intent.customer === "string" ? intent.customer : null
	const { presented, behaviour } = keptMethod(fake, given.payment_method, customer)
	if ("bank" in behaviour) {
		startDebit(fake, intent, presented, given.payment_method, cause)
		return { kind: "paid" }
	}
	const more = { offSession: given.off_session ?? false }
	return chargeCard(fake, intent, { outcome: behaviour.card, presented, method: given.payment_method }, cause, {
		...more,
		...(given.return_url === undefined ? {} : { returnTo: given.return_url }),
	})
}

/** Refuses a method that there is not, before anything is made. */
function checkMethod(fake: Fake, method: string | undefined, customer: string | null): void {
	if (method !== undefined && fake.store.methods.has(method)) keptMethod(fake, method, customer)
	else cardBehind(method)
}

function chargeNamed(fake: Fake, intent: Stripe.PaymentIntent, given: Confirmation, cause: Cause): Attempt {
	const method = given.payment_method
	if (method !== undefined && fake.store.methods.has(method)) {
		return chargeKept(fake, intent, { ...given, payment_method: method }, cause)
	}
	const number = cardBehind(method)
	const year = new Date(fake.seconds() * 1000).getUTCFullYear() + 2
	const card = { number, expMonth: 12, expYear: year, name: null, email: intent.receipt_email }
	return attempt(fake, intent, card, cause, given.return_url === undefined ? {} : { returnTo: given.return_url })
}

function confirm(fake: Fake, intent: Stripe.PaymentIntent, given: Confirmation, cause: Cause): void {
	if (!["requires_payment_method", "requires_confirmation"].includes(intent.status)) {
		throw unexpectedState(`You cannot confirm this PaymentIntent because it has a status of ${intent.status}.`, intent)
	}
	const result = chargeNamed(fake, intent, given, cause)
	if (result.kind !== "declined") return
	throw new StripeRefusal(402, {
		type: "card_error",
		charge: result.charge,
		code: result.code,
		decline_code: result.declineCode,
		message: result.message,
		payment_intent: structuredClone(intent),
	})
}

function capture(fake: Fake, intent: Stripe.PaymentIntent, amount: number | undefined, cause: Cause): void {
	if (intent.status !== "requires_capture") {
		throw unexpectedState(
			`This PaymentIntent could not be captured because it has a status of ${intent.status}.`,
			intent,
		)
	}
	const taken = amount ?? intent.amount_capturable
	if (taken < 1 || taken > intent.amount_capturable) {
		throw invalidRequest("The amount to capture is larger than the amount that can be captured.", {
			code: "amount_too_large",
			param: "amount_to_capture",
		})
	}
	const charge = getCharge(fake, String(intent.latest_charge))
	charge.captured = true
	charge.amount_captured = taken
	intent.status = "succeeded"
	intent.amount_received = taken
	intent.amount_capturable = 0
	recordBalance(fake, charge)
	fake.events.emit("charge.captured", charge, cause)
	fake.events.emit("payment_intent.succeeded", intent, cause)
}

/** Cancels an intent that has not succeeded, emitting payment_intent.canceled; refuses one that cannot be canceled. */
export function cancelIntent(
	fake: Fake,
	intent: Stripe.PaymentIntent,
	reason: Stripe.PaymentIntent.CancellationReason | null,
	cause: Cause,
): void {
	if (["succeeded", "canceled", "processing"].includes(intent.status)) {
		throw unexpectedState(`You cannot cancel this PaymentIntent because it has a status of ${intent.status}.`, intent)
	}
	intent.status = "canceled"
	intent.canceled_at = fake.seconds()
	intent.cancellation_reason = reason
	intent.amount_capturable = 0
	intent.next_action = null
	fake.events.emit("payment_intent.canceled", intent, cause)
}

export const paymentIntentEndpoints: Endpoints = {
	"POST /v1/payment_intents": ({ fake, form, cause }) => {
		const given = readParams(createSchema, form)
		checkAmount(given.amount, given.currency, "amount")
		if (given.customer !== undefined) getCustomer(fake, given.customer, "customer")
		if (given.confirm) checkMethod(fake, given.payment_method, given.customer ?? null)
		const draft = {
			amount: given.amount,
			currency: given.currency,
			allowedTypes: given.allowed_payment_method_types ?? null,
			captureMethod: given.capture_method ?? "automatic",
			customer: given.customer ?? null,
			description: given.description ?? null,
			metadata: mergeMetadata({}, given.metadata),
			receiptEmail: given.receipt_email ?? null,
			automatic: given.automatic_payment_methods?.enabled ?? true,
			futureUsage: null,
		}
		const intent = openIntent(fake, draft, cause)
		if (given.confirm) confirm(fake, intent, given, cause)
		return intent
	},
	"GET /v1/payment_intents": ({ fake, form }) => {
		const { customer, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.intents.values()].filter((row) => customer === undefined || row.customer === customer)
		return page(rows, "/v1/payment_intents", rest)
	},
	"GET /v1/payment_intents/:id": ({ fake, form, id }) => {
		readParams(retrieveSchema, form)
		return getIntent(fake, id)
	},
	"POST /v1/payment_intents/:id": ({ fake, form, id }) => {
		const intent = getIntent(fake, id)
		const given = readParams(updateSchema, form)
		if (given.description !== undefined) intent.description = given.description
		if (given.receipt_email !== undefined) intent.receipt_email = given.receipt_email
		intent.metadata = mergeMetadata(intent.metadata, given.metadata)
		return intent
	},
	"POST /v1/payment_intents/:id/confirm": ({ fake, form, id, cause }) => {
		const intent = getIntent(fake, id)
		confirm(fake, intent, readParams(confirmSchema, form), cause)
		return intent
	},
	"POST /v1/payment_intents/:id/capture": ({ fake, form, id, cause }) => {
		const intent = getIntent(fake, id)
		capture(fake, intent, readParams(captureSchema, form).amount_to_capture, cause)
		return intent
	},
	"POST /v1/payment_intents/:id/cancel": ({ fake, form, id, cause }) => {
		const intent = getIntent(fake, id)
		const { cancellation_reason } = readParams(cancelSchema, form)
		cancelIntent(fake, intent, cancellation_reason ?? null, cause)
		return intent
	},
}
