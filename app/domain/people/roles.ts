/** Roles at a producer. */
export const producerRoles = ["owner", "desk", "packer", "stall"] as const
export type ProducerRole = (typeof producerRoles)[number]

/** Roles at a store; a payer may do all that a buyer may. */
export const storeRoles = ["buyer", "payer"] as const
export type StoreRole = (typeof storeRoles)[number]

export type Role = ProducerRole | StoreRole

/** Whether `role` is one at a store, and so names a store. */
export function isStoreRole(role: Role): role is StoreRole {
	return role === "buyer" || role === "payer"
}

/** Orders, sharing, invoices, payments, statements: the desk. */
export function mayRunDesk(role: Role): boolean {
	return role === "owner" || role === "desk"
}

/** Prices, terms, rounds, tax rates, payment keys: the owner alone. */
export function mayChangeSettings(role: Role): boolean {
	return role === "owner"
}

/** Inviting people and taking their roles away: the owner alone. */
export function mayManagePeople(role: Role): boolean {
	return role === "owner"
}

/** Picking, weighing, packing, loading the van. */
export function mayPack(role: Role): boolean {
	return role === "owner" || role === "desk" || role === "packer"
}

/** Selling at a market day: the owner on any, a volunteer only on a day they are named on. */
export function maySellOn(role: Role, isNamedOnDay: boolean): boolean {
	return role === "owner" || (role === "stall" && isNamedOnDay)
}

/** Placing orders and keeping standing orders for a store. */
export function mayOrder(role: Role): boolean {
	return isStoreRole(role)
}

/** Paying a store's invoices. */
export function mayPay(role: Role): boolean {
	return role === "payer"
}
