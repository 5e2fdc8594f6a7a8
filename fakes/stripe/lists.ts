import type Stripe from "stripe"
import { invalidRequest, noSuch } from "./errors"
import type { Paging } from "./params"

type Row = { id: string; created?: number }

function withinBounds(row: Row, bounds: Paging["created"]): boolean {
	if (bounds === undefined) return true
	const at = row.created ?? 0
	if (typeof bounds === "number") return at === bounds
	return (
		(bounds.gt === undefined || at > bounds.gt) &&
		(bounds.gte === undefined || at >= bounds.gte) &&
		(bounds.lt === undefined || at < bounds.lt) &&
		(bounds.lte === undefined || at <= bounds.lte)
	)
}

/**
 * One page of `rows`, newest first, as Stripe's lists answer: `limit` 1 to 100 (10 if unset), `starting_after` and
 * `ending_before` by id, `has_more` in the direction walked. Refuses another limit and a cursor that names nothing.
 */
export function page<T extends Row>(rows: Iterable<T>, url: string, paging: Paging): Stripe.ApiList<T> {
	const limit = paging.limit ?? 10
	if (limit < 1 || limit > 100) throw invalidRequest("This value must be between 1 and 100.", { param: "limit" })
	const all = [...rows].filter((row) => withinBounds(row, paging.created)).reverse()
	const place = (id: string, param: string) => {
		const index = all.findIndex((row) => row.id === id)
		if (index < 0) throw noSuch("object", id, param)
		return index
	}
	if (paging.ending_before !== undefined) {
		const end = place(paging.ending_before, "ending_before")
		const start = Math.max(0, end - limit)
		return { object: "list", data: all.slice(start, end), has_more: start > 0, url }
	}
	const start = paging.starting_after === undefined ? 0 : place(paging.starting_after, "starting_after") + 1
	return { object: "list", data: all.slice(start, start + limit), has_more: start + limit < all.length, url }
}
