import type Stripe from "stripe"
import { z } from "zod"
import { noSuch } from "./errors"
import { fromPage } from "./events"
import type { Fake } from "./fake"
import { newId } from "./ids"
import { expandable, readParams } from "./params"
import { attachMethod } from "./payment-methods"
import type { Endpoints } from "./router"

/** Keeps a method for a customer under a setup intent of its own (setup_intent.created, setup_intent.succeeded). */
export function setUpMethod(
	fake: Fake,
	of: { method: string; type: string; customer: string; metadata: Record<string, string> },
): Stripe.SetupIntent {
	const id = newId("seti")
	const intent: Stripe.SetupIntent = {
		id,
		object: "setup_intent",
		allowed_payment_method_types: null,
		application: null,
		automatic_payment_methods: null,
		cancellation_reason: null,
		client_secret: newId(`${id}_secret`),
		created: fake.seconds(),
		customer: of.customer,
		description: null,
		excluded_payment_method_types: null,
		last_setup_error: null,
		latest_attempt: null,
		livemode: false,
		mandate: null,
		metadata: of.metadata,
		next_action: null,
		on_behalf_of: null,
		payment_method: of.method,
		payment_method_configuration_details: null,
		payment_method_options: {},
		payment_method_types: [of.type],
		single_use_mandate: null,
		status: "succeeded",
		usage: "off_session",
	}
	fake.store.setupIntents.set(id, intent)
	fake.events.emit("setup_intent.created", intent, fromPage)
	attachMethod(fake, of.method, of.customer, fromPage)
	fake.events.emit("setup_intent.succeeded", intent, fromPage)
	return intent
}

export const setupIntentEndpoints: Endpoints = {
	"GET /v1/setup_intents/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		const intent = fake.store.setupIntents.get(id)
		if (!intent) throw noSuch("setupintent", id)
		return intent
	},
}
