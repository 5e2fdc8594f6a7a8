import { invalidRequest } from "./errors"
import type { Store } from "./store"

type Json = { [key: string]: unknown }

function isObject(value: unknown): value is Json {
	return typeof value === "object" && value !== null && !Array.isArray(value)
}

function fetchById(store: Store, id: string): unknown {
	const prefix = id.slice(0, id.indexOf("_"))
	if (prefix === "cus") return store.customers.get(id)
	if (prefix === "pi") return store.intents.get(id)
	if (prefix === "ch") return store.charges.get(id)
	if (prefix === "pm") return store.methods.get(id)
	if (prefix === "seti") return store.setupIntents.get(id)
	if (prefix === "txn") return store.balanceTransactions.get(id)
	if (prefix === "re") return store.refunds.get(id)
	if (prefix === "du") return store.disputes.get(id)
	if (prefix === "po") return store.payouts.get(id)
	return undefined
}

/** Parts that Stripe leaves out of an object until they are asked for. */
function includable(store: Store, object: Json, name: string): unknown {
	if (object.object === "checkout.session" && name === "line_items") {
		const lines = store.sessionSecrets.get(String(object.id))?.lines ?? []
		return { object: "list", data: lines, has_more: false, url: `/v1/checkout/sessions/${object.id}/line_items` }
	}
	if (object.object === "charge" && name === "refunds") {
		const refunds = [...store.refunds.values()].filter((refund) => refund.charge === object.id).reverse()
		return { object: "list", data: refunds, has_more: false, url: `/v1/charges/${object.id}/refunds` }
	}
	return undefined
}

function expandOne(store: Store, object: Json, path: string[], whole: string): void {
	const [name, ...rest] = path
	if (name === undefined) return
	if (Array.isArray(object[name])) {
		for (const item of object[name]) if (isObject(item)) expandOne(store, item, rest, whole)
		return
	}
	const current = object[name]
	// Null is a place that could hold something: Stripe lets it be asked for and answers null.
	if (current === null) return
	const found = typeof current === "string" ? fetchById(store, current) : (current ?? includable(store, object, name))
	if (!isObject(found)) {
		throw invalidRequest(`This property cannot be expanded (${whole}).`, { param: "expand" })
	}
	object[name] = structuredClone(found)
	expandOne(store, object[name] as Json, rest, whole)
}

/** A copy of `object` with the ids under `paths` (such as `payment_intent.latest_charge`) replaced by their objects. */
export function expand<T extends object>(store: Store, object: T, paths: string[] = []): T {
	const copy = structuredClone(object)
	for (const path of paths) expandOne(store, copy as unknown as Json, path.split("."), path)
	return copy
}
