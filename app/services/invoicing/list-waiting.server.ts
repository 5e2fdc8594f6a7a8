import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"

/** A store with sent orders that are on no invoice yet. */
export type WaitingStore = {
	storeId: string
	storeName: string
	isMonthly: boolean
	orderNumbers: number[]
	firstOn: Day
	lastOn: Day
	/** By the prices of the orders, before sales tax. */
	aboutCents: number
}

/** Stores whose sent orders of the last year wait for an invoice, by name. */
export function listWaiting(query: { producerId: string; today: Day }): Promise<WaitingStore[]> {
	const { producerId, today } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<WaitingStore>(sql`
			select s.id as "storeId", s.name as "storeName", s.invoicing = 'month-end' as "isMonthly",
				array_agg(o.number order by o.delivery_on, o.number) as "orderNumbers",
				min(o.delivery_on)::text as "firstOn", max(o.delivery_on)::text as "lastOn",
				sum(o.delivery_cents + coalesce(l.cents, 0))::int as "aboutCents"
			from orders o
			join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			left join lateral (
				select sum(case when e.pound_cents is null or e.weighed_grams is null
					then coalesce(e.given_cases, 0) * e.case_cents
					else round(e.weighed_grams * e.pound_cents / 453.59237) end) as cents
				from order_lines e where e.producer_id = o.producer_id and e.order_id = o.id) l on true
			where o.producer_id = ${producerId} and o.state in ('sent', 'received')
				and o.delivery_on > ${addDays(today, -400)}
				and not exists (select from invoice_orders x where x.producer_id = o.producer_id and x.order_id = o.id)
			group by s.id, s.name, s.invoicing
			order by s.name, s.id`)
		return rows
	})
}
