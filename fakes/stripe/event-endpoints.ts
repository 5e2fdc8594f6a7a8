import type Stripe from "stripe"
import { z } from "zod"
import { noSuch } from "./errors"
import { page } from "./lists"
import { expandable, list, paging, paramsOf, readParams } from "./params"
import type { Endpoints } from "./router"

const listSchema = paramsOf<Stripe.EventListParams>()({
	...paging,
	type: z.string().optional(),
	types: list(z.string()).optional(),
})

function matches(type: string, wanted: string): boolean {
	return wanted.endsWith("*") ? type.startsWith(wanted.slice(0, -1)) : type === wanted
}

export const eventEndpoints: Endpoints = {
	"GET /v1/events": ({ fake, form }) => {
		const { type, types, ...rest } = readParams(listSchema, form)
		const rows = [...fake.store.events.values()].filter(
			(row) => (type === undefined || matches(row.type, type)) && (!types || types.includes(row.type)),
		)
		return page(rows, "/v1/events", rest)
	},
	"GET /v1/events/:id": ({ fake, form, id }) => {
		readParams(z.strictObject(expandable), form)
		const event = fake.store.events.get(id)
		if (!event) throw noSuch("event", id)
		return event
	},
}
