import Stripe from "stripe"
import { newId } from "./ids"
import type { Store } from "./store"

/** The API call that an event came from. */
export type Cause = Stripe.Event.Request
/** The cause of what a person does on a page, or what time does. */
export const fromPage: Cause = { id: null, idempotency_key: null }

type EventOf<Type extends Stripe.Event.Type> = Extract<Stripe.Event, { type: Type }>

/** Records an event of `type` about a copy of `object` and hands it on for delivery. */
export type Emit = <Type extends Stripe.Event.Type>(
	type: Type,
	object: EventOf<Type>["data"]["object"],
	cause: Cause,
) => void

export type EventLog = { emit: Emit }

/** An event log over `store`. `deliver` is called with each new event and must not throw. */
export function createEventLog(
	store: Store,
	seconds: () => number,
	deliver: (event: Stripe.Event) => void,
	hasEndpoint: boolean,
): EventLog {
	return {
		emit(type, object, cause) {
			const event = {
				id: newId("evt"),
				object: "event",
				api_version: Stripe.API_VERSION,
				created: seconds(),
				data: { object: structuredClone(object) },
				livemode: false,
				pending_webhooks: hasEndpoint ? 1 : 0,
				request: cause,
				type,
			} satisfies Stripe.EventBase as unknown as Stripe.Event
			store.events.set(event.id, event)
			deliver(event)
		},
	}
}
