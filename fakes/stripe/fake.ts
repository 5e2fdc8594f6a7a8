import type { EventLog } from "./events"
import type { Store } from "./store"
import type { Switches } from "./switches"

/** What every part of the fake works with. */
export type Fake = {
	store: Store
	switches: Switches
	events: EventLog
	/** Where people and clients reach the fake, without a slash at the end. Known once it listens. */
	url: string
	/** The moment in whole seconds, as Stripe writes times. */
	seconds: () => number
}
