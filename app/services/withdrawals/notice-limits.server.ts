import type { Limit } from "~/platform/rate-limit.server"

/** A chain's stores may answer from one office: generous, and no use for trying links. */
export const ANSWERS_PER_NETWORK: Limit = { name: "notices-network", points: 120, seconds: 15 * 60 }
