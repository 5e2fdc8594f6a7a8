import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type Day, isDay } from "~/domain/calendar"
import type { OrderState } from "~/domain/orders/order-states"
import { lineCentsSql } from "./line-cents.server"

/** An order in a list; money is what was asked at its prices, or what was given once that is decided, with delivery. */
export type ListedOrder = {
	number: number
	deliveryOn: Day
	state: OrderState
	askedCases: number
	cases: number
	toShareCases: number
	totalCents: number
}

type Row = {
	id: string
	number: number
	delivery_on: Day
	state: OrderState
	asked_cases: number
	cases: number
	to_share_cases: number
	total_cents: number
}

const PAGE = 30

/**
 * The store's orders by delivery day, the latest first, 30 at a time. `after` is the `next` of an earlier page; one that
 * is malformed gives the first page. `next` is null on the last page.
 */
export function listStoreOrders(query: {
	producerId: string
	storeId: string
	after: string | null
}): Promise<{ orders: ListedOrder[]; next: string | null }> {
	const { producerId, storeId } = query
	const [on = "", id = ""] = query.after?.split("_") ?? []
	const isKey = isDay(on) && /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/.test(id)
	const beyond = isKey ? sql`and (o.delivery_on, o.id) < (${on}::date, ${id}::uuid)` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			with page as (
				select o.id, o.number, o.delivery_on, o.state, o.delivery_cents
				from orders o
				where o.producer_id = ${producerId} and o.store_id = ${storeId} ${beyond}
				order by o.delivery_on desc, o.id desc
				limit ${PAGE + 1}
			)
			select page.id, page.number, page.delivery_on::text, page.state,
				sum(l.asked_cases)::int as asked_cases,
				sum(coalesce(l.given_cases, case when l.is_to_share then l.promised_cases else l.asked_cases end))::int as cases,
				sum(case when l.is_to_share and l.given_cases is null then l.asked_cases - l.promised_cases else 0 end)::int as to_share_cases,
				(page.delivery_cents + sum(${lineCentsSql}))::int as total_cents
			from page
			join order_lines l on l.producer_id = ${producerId} and l.order_id = page.id
			group by page.id, page.number, page.delivery_on, page.state, page.delivery_cents
			order by page.delivery_on desc, page.id desc`)
		const shown = rows.slice(0, PAGE)
		const last = shown.at(-1)
		return {
			orders: shown.map((row) => ({
				number: row.number,
				deliveryOn: row.delivery_on,
				state: row.state,
				askedCases: row.asked_cases,
				cases: row.cases,
				toShareCases: row.to_share_cases,
				totalCents: row.total_cents,
			})),
			next: rows.length > PAGE && last ? `${last.delivery_on}_${last.id}` : null,
		}
	})
}
