/** What a person can be at a producer. */
export const PRODUCER_ROLES = ["owner", "desk", "packer", "stall"] as const
export type ProducerRole = (typeof PRODUCER_ROLES)[number]

/** What a person can be at a store: a buyer orders, a payer orders and pays. */
export const STORE_ROLES = ["buyer", "payer"] as const
export type StoreRole = (typeof STORE_ROLES)[number]
