import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type Day, isDay } from "~/domain/calendar"
import type { OrderState } from "~/domain/orders/order-states"
import { lineCentsSql } from "./line-cents.server"

/** An order in the desk's list; money is what was asked, or given once that is decided, with delivery. */
export type DeskOrderRow = {
	number: number
	deliveryOn: Day
	storeName: string
	state: OrderState
	askedCases: number
	cases: number
	toShareCases: number
	totalCents: number
}

const PAGE = 40

/**
 * The producer's orders by delivery day, the latest first, 40 at a time, of one state or one day where they are named.
 * `after` is the `next` of an earlier page; one that is malformed gives the first page. `next` is null on the last page.
 */
export function listDeskOrders(query: {
	producerId: string
	state: OrderState | null
	day: Day | null
	after: string | null
}): Promise<{ orders: DeskOrderRow[]; next: string | null }> {
	const { producerId, state, day } = query
	const [on = "", number = ""] = query.after?.split("_") ?? []
	const isKey = isDay(on) && /^[1-9]\d{0,8}$/.test(number)
	const beyond = isKey ? sql`and (o.delivery_on, o.number) < (${on}::date, ${Number(number)}::int)` : sql``
	const ofState = state ? sql`and o.state = ${state}` : sql``
	const ofDay = day ? sql`and o.delivery_on = ${day}` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<DeskOrderRow>(sql`
			with page as (
				select o.id, o.number, o.delivery_on, o.state, o.delivery_cents, s.name
				from orders o
				join stores s on s.producer_id = o.producer_id and s.id = o.store_id
				where o.producer_id = ${producerId} ${ofState} ${ofDay} ${beyond}
				order by o.delivery_on desc, o.number desc
				limit ${PAGE + 1}
			)
			select page.number, page.delivery_on::text as "deliveryOn", page.state, page.name as "storeName",
				sum(l.asked_cases)::int as "askedCases",
				sum(coalesce(l.given_cases, case when l.is_to_share then l.promised_cases else l.asked_cases end))::int as cases,
				sum(case when l.is_to_share and l.given_cases is null then l.asked_cases - l.promised_cases else 0 end)::int as "toShareCases",
				(page.delivery_cents + sum(${lineCentsSql}))::int as "totalCents"
			from page
			join order_lines l on l.producer_id = ${producerId} and l.order_id = page.id
			group by page.id, page.number, page.delivery_on, page.state, page.delivery_cents, page.name
			order by page.delivery_on desc, page.number desc`)
		const orders = rows.slice(0, PAGE)
		const last = orders.at(-1)
		return { orders, next: rows.length > PAGE && last ? `${last.deliveryOn}_${last.number}` : null }
	})
}
