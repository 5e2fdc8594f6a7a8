import type Stripe from "stripe"
import { z } from "zod"
import { blankSession } from "./blank-session"
import { getCustomer } from "./customers"
import { invalidRequest, noSuch } from "./errors"
import { type Cause, fromPage } from "./events"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { lineItemSchema, makeLines } from "./line-items"
import { page } from "./lists"
import { currency, expandable, integer, list, mergeMetadata, metadata, paging, paramsOf, readParams } from "./params"
import { cancelIntent } from "./payment-intents"
import type { Endpoints } from "./router"

const SHORTEST = 30 * 60
const LONGEST = 24 * 60 * 60

const createSchema = paramsOf<Stripe.Checkout.SessionCreateParams>()({
	...expandable,
	allowed_payment_method_types: list(z.enum(["card", "us_bank_account"]))
		.refine((types) => types.length === 1, "The payment fake knows one type a session")
		.optional(),
	currency: currency.optional(),
	mode: z.enum(["payment", "setup"], "The payment fake knows the modes payment and setup"),
	line_items: list(lineItemSchema).optional(),
	success_url: z.url("Not a valid URL"),
	cancel_url: z.url("Not a valid URL").optional(),
	client_reference_id: z.string().max(200).optional(),
	customer: z.string().optional(),
	customer_email: z.email("Invalid email address").optional(),
	expires_at: integer.optional(),
	locale: z.string().optional(),
	metadata: metadata.optional(),
	payment_intent_data: z
		.strictObject({
			description: z.string().optional(),
			metadata: metadata.optional(),
			setup_future_usage: z.literal("off_session").optional(),
		})
		.optional(),
	saved_payment_method_options: z
		.strictObject({ allow_redisplay_filters: list(z.enum(["always", "limited", "unspecified"])).optional() })
		.optional(),
	setup_intent_data: z.strictObject({ metadata: metadata.optional() }).optional(),
	submit_type: z.enum(["auto", "book", "donate", "pay"]).optional(),
})
const updateSchema = paramsOf<Stripe.Checkout.SessionUpdateParams>()({ ...expandable, metadata: metadata.optional() })
const listSchema = paramsOf<Stripe.Checkout.SessionListParams>()({
	...paging,
	customer: z.string().optional(),
	payment_intent: z.string().optional(),
	status: z.enum(["complete", "expired", "open"]).optional(),
})

/** Where a person pays the session. */
export function payUrl(fake: Fake, id: string): string {
	return `${fake.url}/pay/${id}`
}

/** The session named `id`; refuses with 404 `resource_missing`. */
function getSession(fake: Fake, id: string): Stripe.Checkout.Session {
	const session = fake.store.sessions.get(id)
	if (!session) throw noSuch("checkout.session", id, "session")
	return session
}

function checkExpiry(fake: Fake, asked: number | undefined): number {
	const now = fake.seconds()
	if (asked === undefined) return now + LONGEST
	const wrong = (bound: string) =>
		invalidRequest(`The \`expires_at\` timestamp must be ${bound} from Checkout Session creation.`, {
			param: "expires_at",
		})
	if (asked < now + SHORTEST) throw wrong("at least 30 minutes")
	if (asked > now + LONGEST) throw wrong("less than 24 hours")
	return asked
}

/** Refuses a session that keeps a method and also sells something, or for nobody. */
function checkSetup(given: z.infer<typeof createSchema>): void {
	if (given.line_items) {
		throw invalidRequest("You can not pass `line_items` in `setup` mode.", { param: "line_items" })
	}
	if (given.payment_intent_data) {
		throw invalidRequest("You can not pass `payment_intent_data` in `setup` mode.", { param: "payment_intent_data" })
	}
	// Stripe makes a customer here when told to; this fake wants the one that the method is kept for.
	if (given.customer === undefined) {
		throw invalidRequest("Missing required param: customer.", { code: "parameter_missing", param: "customer" })
	}
}

function create(fake: Fake, given: z.infer<typeof createSchema>): Stripe.Checkout.Session {
	if (given.customer !== undefined && given.customer_email !== undefined) {
		throw invalidRequest("You may only specify one of these parameters: customer, customer_email.", {
			code: "parameters_exclusive",
			param: "customer_email",
		})
	}
	const customer = given.customer === undefined ? null : getCustomer(fake, given.customer, "customer")
	const expiresAt = checkExpiry(fake, given.expires_at)
	if (given.mode === "setup") checkSetup(given)
	const made =
		given.mode === "payment" ? makeLines(fake, given.line_items ?? []) : { lines: [], total: null, currency: "usd" }
	const { lines, total } = made
	const id = newId("cs_test", 40)
	const session: Stripe.Checkout.Session = {
		...blankSession,
		id,
		allowed_payment_method_types: given.allowed_payment_method_types ?? null,
		amount_subtotal: total,
		amount_total: total,
		mode: given.mode,
		payment_method_types: given.allowed_payment_method_types ?? ["card"],
		cancel_url: given.cancel_url ?? null,
		client_reference_id: given.client_reference_id ?? null,
		created: fake.seconds(),
		currency: made.currency,
		customer: customer?.id ?? null,
		customer_creation: customer ? null : "if_required",
		customer_email: given.customer_email ?? null,
		expires_at: expiresAt,
		locale: given.locale ?? null,
		metadata: mergeMetadata({}, given.metadata),
		submit_type: given.submit_type ?? null,
		success_url: given.success_url,
		url: payUrl(fake, id),
	}
	fake.store.sessions.set(id, session)
	fake.store.sessionSecrets.set(id, {
		lines,
		intentDescription: given.payment_intent_data?.description ?? null,
		intentMetadata: mergeMetadata({}, given.payment_intent_data?.metadata),
		futureUsage: given.payment_intent_data?.setup_future_usage ?? null,
		setupMetadata: mergeMetadata({}, given.setup_intent_data?.metadata),
	})
	return session
}

/** Ends an open session and what was begun under it; emits checkout.session.expired. */
function expire(fake: Fake, session: Stripe.Checkout.Session, cause: Cause): void {
	session.status = "expired"
	session.url = null
	const intent = fake.store.intents.get(String(session.payment_intent))
	if (intent && intent.status !== "canceled") cancelIntent(fake, intent, "automatic", cause)
	fake.events.emit("checkout.session.expired", session, cause)
}

/** Expires every open session whose time has come; called before each request and now and then. */
export function expireDue(fake: Fake): void {
	for (const session of fake.store.sessions.values()) {
		if (session.status === "open" && session.expires_at <= fake.seconds()) expire(fake, session, fromPage)
	}
}

export const checkoutSessionEndpoints: Endpoints = {
	"POST /v1/checkout/sessions": ({ fake, form }) => create(fake, readParams(createSchema, form)),
	"GET /v1/checkout/sessions": ({ fake, form }) => {
		const { customer, payment_intent, status, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.sessions.values()].filter(
			(row) =>
				(customer === undefined || row.customer === customer) &&
				(payment_intent === undefined || row.payment_intent === payment_intent) &&
				(status === undefined || row.status === status),
		)
		return page(rows, "/v1/checkout/sessions", rest)
	},
	"GET /v1/checkout/sessions/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		return getSession(fake, id)
	},
	"POST /v1/checkout/sessions/:id": ({ fake, form, id }) => {
		const session = getSession(fake, id)
		session.metadata = mergeMetadata(session.metadata ?? {}, readParams(updateSchema, form).metadata)
		return session
	},
	"GET /v1/checkout/sessions/:id/line_items": ({ fake, form, id }) => {
		const given = readParams(z.strictObject(paging), form)
		getSession(fake, id)
		// Lines are answered in their own order, not newest first.
		const lines = [...(fake.store.sessionSecrets.get(id)?.lines ?? [])].reverse()
		return page(lines, `/v1/checkout/sessions/${id}/line_items`, given)
	},
	"POST /v1/checkout/sessions/:id/expire": ({ fake, form, id, cause }) => {
		readParams(z.strictObject(expandable), form)
		const session = getSession(fake, id)
		if (session.status !== "open") {
			throw invalidRequest(
				`Only Checkout Sessions with a status in ["open"] can be expired. This Checkout Session has a status of \`${session.status}\`.`,
			)
		}
		expire(fake, session, cause)
		return session
	},
}
