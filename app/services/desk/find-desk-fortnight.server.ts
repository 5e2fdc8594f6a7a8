import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day, fortnight } from "~/domain/calendar"
import {
	deliveryDaysOf,
	findDeliverySchedule,
	type OpenOrClosedDay,
} from "~/services/delivery/find-delivery-days.server"
import { caseStrips } from "~/services/orders/cases-on-day.server"
import { ribbonStart } from "~/services/orders/find-fortnight.server"
import { promiseDay } from "~/services/orders/find-most-cases.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { findOpenOrders } from "./find-open-orders.server"
import { findShortages } from "./shortages.server"

/** One of the fourteen days of the desk's ribbon; figures are whole cases over all products and stores. */
export type DeskDay = {
	on: Day
	delivery: OpenOrClosedDay | null
	marketName: string | null
	/** What orders for the day are promised, or have had. */
	promisedCases: number
	/** What could still be promised for it. */
	freeCases: number
	/** What is wanted for it and cannot be there. */
	shortCases: number
	/** To come off the hives that day, at the figure that the producer chose. */
	expectedCases: number
}

/** The ribbon of the desk: the fortnight that shows `day`, or today's, at one moment. */
export function findDeskFortnight(query: {
	producerId: string
	now: Date
	zone: string
	day?: Day
}): Promise<DeskDay[]> {
	const { producerId, now, zone } = query
	return readProducer(producerId, async (tx) => {
		const schedule = await findDeliverySchedule(tx, { producerId, storeId: null, now, zone })
		const { today } = schedule
		const from = ribbonStart(today, query.day ?? today)
		const days = fortnight(from)
		const deliveries = new Map(deliveryDaysOf(schedule, 14, from).map((day) => [day.on, day]))
		const outlooks = await findOutlooks(tx, { producerId, today })
		const open = await findOpenOrders(tx, { producerId, states: ["placed", "confirmed"] })
		// What is short on a day is told by the orders of that day: those of the weeks after it need no working out.
		const orders = open.filter(({ deliveryOn }) => days.includes(promiseDay(deliveryOn, today)))
		const shortages = findShortages({ orders, outlooks, today })
		const ahead = days.filter((on) => on >= today && deliveries.has(on))
		const free = new Map(ahead.map((on) => [on, 0]))
		for (const outlook of outlooks.values()) {
			for (const [index, strip] of caseStrips(outlook, ahead).entries()) {
				const on = ahead[index] as Day
				free.set(on, (free.get(on) ?? 0) + strip.freeCases)
			}
		}
		const figures = await figuresByDay(tx, { producerId, from })
		return days.map((on) => ({
			on,
			delivery: deliveries.get(on) ?? null,
			marketName: figures.get(on)?.market ?? null,
			promisedCases: figures.get(on)?.promised ?? 0,
			freeCases: free.get(on) ?? 0,
			shortCases: shortages.reduce((sum, one) => sum + (one.deliveryOn === on ? one.shortCases : 0), 0),
			expectedCases: figures.get(on)?.expected ?? 0,
		}))
	})
}

type Figures = { on: Day; promised: number; expected: number; market: string | null }

async function figuresByDay(tx: Tx, query: { producerId: string; from: Day }): Promise<Map<Day, Figures>> {
	const { producerId, from } = query
	const to = addDays(from, 13)
	const { rows } = await tx.execute<Figures>(sql`
		select on_day::text as "on", sum(promised)::int as promised, sum(expected)::int as expected, max(market) as market
		from (
			select o.delivery_on as on_day, 0 as expected, null::text as market,
				sum(coalesce(l.given_cases, case when l.is_to_share then l.promised_cases else l.asked_cases end)) as promised
			from orders o join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
			where o.producer_id = ${producerId} and o.state <> 'cancelled' and o.delivery_on between ${from} and ${to}
			group by o.delivery_on
			union all
			select e.expected_on,
				(case s.crop_figure when 'likely' then e.likely_pieces else e.low_pieces end) / p.pieces_per_case, null, 0
			from expected_supplies e
			join products p on p.producer_id = e.producer_id and p.id = e.product_id
			left join producer_settings s on s.producer_id = e.producer_id
			where e.producer_id = ${producerId} and e.expected_on between ${from} and ${to}
			union all
			select d.market_on, 0, m.name, 0
			from market_days d join markets m on m.producer_id = d.producer_id and m.id = d.market_id
			where d.producer_id = ${producerId} and d.market_on between ${from} and ${to}
		) as parts
		group by on_day`)
	return new Map(rows.map((row) => [row.on, row]))
}
