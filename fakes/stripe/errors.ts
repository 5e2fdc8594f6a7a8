import type Stripe from "stripe"

/** The parts of Stripe's error body that this fake fills in; the SDK reads `type`, `code` and `param`. */
type ErrorBody = {
	type: "api_error" | "card_error" | "idempotency_error" | "invalid_request_error" | "rate_limit_error"
	message: string
	code?: string
	decline_code?: string
	param?: string
	charge?: string
	payment_intent?: Stripe.PaymentIntent
	doc_url?: string
}

/** A refusal that is answered as `{ "error": … }` with `status`, the way Stripe words it. */
export class StripeRefusal extends Error {
	constructor(
		readonly status: number,
		readonly body: ErrorBody,
		readonly headers: Record<string, string> = {},
	) {
		super(body.message)
	}
}

/** 400 for a parameter that is missing, malformed or not allowed now. */
export function invalidRequest(message: string, more: { code?: string; param?: string } = {}): StripeRefusal {
	return new StripeRefusal(400, { type: "invalid_request_error", message, ...more })
}

/** 404 for an id that names nothing; `what` is the object's name as Stripe writes it. */
export function noSuch(what: string, id: string, param = "id"): StripeRefusal {
	return new StripeRefusal(404, {
		type: "invalid_request_error",
		code: "resource_missing",
		message: `No such ${what}: '${id}'`,
		param,
	})
}

/** 400 for a payment intent whose status does not allow what was asked. */
export function unexpectedState(message: string, intent: Stripe.PaymentIntent): StripeRefusal {
	return new StripeRefusal(400, {
		type: "invalid_request_error",
		code: "payment_intent_unexpected_state",
		message,
		payment_intent: intent,
	})
}
