import type { Limit } from "~/platform/rate-limit.server"

const QUARTER_HOUR = 15 * 60
const DAY = 24 * 60 * 60

/** Mails that anyone can have sent to one address; with five tries a code, also a bound on guessing. */
export const CODES_PER_ADDRESS: Limit = { name: "codes-address", points: 5, seconds: QUARTER_HOUR }
export const CODES_PER_ADDRESS_AND_DAY: Limit = { name: "codes-address-day", points: 20, seconds: DAY }
/** A farm, a shop or a market hall shares one network address: generous, and still no use to a mailer. */
export const CODES_PER_NETWORK: Limit = { name: "codes-network", points: 40, seconds: QUARTER_HOUR }
export const TRIES_PER_NETWORK: Limit = { name: "tries-network", points: 100, seconds: QUARTER_HOUR }

export const INVITATIONS_PER_ADDRESS: Limit = { name: "invitations-address", points: 5, seconds: DAY }
export const INVITATIONS_PER_PRODUCER: Limit = { name: "invitations-producer", points: 100, seconds: DAY }

/** Anyone can post without a session, so what is kept of it is bounded. */
export const KEPT_PER_NETWORK: Limit = { name: "kept-network", points: 60, seconds: 60 * 60 }
