import { StripeRefusal } from "./errors"
import type { Cause } from "./events"
import type { Fake } from "./fake"
import type { FormTree } from "./form"

/** One API call: its decoded form or query, and the id in its path ("" when there is none). */
export type Call = { fake: Fake; form: FormTree; id: string; cause: Cause }

/** Endpoints by "METHOD /path/:id"; each answers the object that goes out, and refuses by throwing. */
export type Endpoints = { [route: `${"GET" | "POST"} /v1/${string}`]: (call: Call) => object }

type Route = { method: string; pattern: RegExp; handle: (call: Call) => object }

/** Finds the endpoint for a method and a path. Fixed words win over `:id`, so the order of writing does not matter. */
export function createRouter(endpoints: Endpoints) {
	const routes: Route[] = Object.entries(endpoints)
		.sort(([a], [b]) => Number(a.includes(":id")) - Number(b.includes(":id")))
		.map(([route, handle]) => {
			const [method = "", path = ""] = route.split(" ")
			return { method, pattern: new RegExp(`^${path.replace(":id", "([^/]+)")}$`), handle }
		})
	return (method: string, path: string): { handle: (call: Call) => object; id: string } => {
		for (const route of routes) {
			const match = route.method === method ? route.pattern.exec(path) : null
			if (match) return { handle: route.handle, id: decodeURIComponent(match[1] ?? "") }
		}
		throw new StripeRefusal(404, {
			type: "invalid_request_error",
			message: `Unrecognized request URL (${method}: ${path}). The payment fake does not know it.`,
		})
	}
}
