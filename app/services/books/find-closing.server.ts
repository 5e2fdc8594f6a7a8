import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day, dayInZone, endOfMonth } from "~/domain/calendar"
import { readClosings } from "./read-closings.server"

/** What is still open up to a day: a count, and some of it by name, the earliest first. */
type StillOpen = {
	of: "sent-not-invoiced" | "on-its-way" | "refund-asked" | "stripe-differs" | "market-open"
	count: number
	/** Numbers of orders, names of stores with amounts, markets with days. */
	examples: { words: string; on: Day; cents: number | null }[]
}

type ClosingPage = {
	until: Day
	/** The last day that can be chosen. */
	latest: Day
	/** The first day that is not closed yet; null where nothing is closed. */
	firstOpen: Day | null
	stillOpen: StillOpen[]
	earlier: { until: Day; closedBy: string; closedOn: Day }[]
}

/** Named of each kind; the rest is counted. */
const NAMED = 5

/**
 * What is to be known before the books are closed until a day: what is still open in it, and the earlier closings. Without
 * a day it is the end of the last whole month that is not closed, or yesterday where that month has not ended.
 */
export function findClosing(query: {
	producer: { id: string; timeZone: string }
	until: Day | null
	today: Day
}): Promise<ClosingPage> {
	const { producer, today } = query
	return readProducer(producer.id, async (tx) => {
		const closings = await readClosings(tx, producer.id)
		const last = closings.at(-1)
		const latest = addDays(today, -1)
		const firstOpen = last ? addDays(last.until, 1) : null
		const until = query.until ?? suggested(today, firstOpen)
		return {
			until,
			latest,
			firstOpen,
			stillOpen: (await readStillOpen(tx, producer, until)).filter(({ count }) => count > 0),
			earlier: closings.toReversed().map(({ until, closedBy, closedAt }) => ({
				until,
				closedBy,
				closedOn: dayInZone(closedAt, producer.timeZone),
			})),
		}
	})
}

function suggested(today: Day, firstOpen: Day | null): Day {
	const endOfLast = addDays(`${today.slice(0, 8)}01`, -1)
	const next = firstOpen ? endOfMonth(firstOpen) : endOfLast
	return next < today ? next : addDays(today, -1)
}

type Row = { of: StillOpen["of"]; words: string; on: Day; cents: number | null; count: number }

/** Each kind along its own index, its first few with the count of all. */
async function readStillOpen(
	tx: Tx,
	{ id: producerId, timeZone }: { id: string; timeZone: string },
	until: Day,
): Promise<StillOpen[]> {
	const { rows } = await tx.execute<Row>(sql`
		select * from (
			(select 'sent-not-invoiced' as of, o.number::text || ', ' || s.name as words, o.delivery_on::text as on, null::int as cents,
				count(*) over ()::int as count
			from orders o join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			where o.producer_id = ${producerId} and o.state in ('sent', 'received') and o.delivery_on <= ${until}::date
				and not exists (select from invoice_orders x where x.producer_id = o.producer_id and x.order_id = o.id)
			order by o.delivery_on, o.id limit ${NAMED})
			union all
			(select 'on-its-way', s.name, p.received_on::text, p.amount_cents, count(*) over ()::int
			from payments p join stores s on s.producer_id = p.producer_id and s.id = p.store_id
			where p.producer_id = ${producerId} and p.state = 'on-its-way' and p.received_on <= ${until}::date
			order by p.received_on, p.id limit ${NAMED})
			union all
			(select 'refund-asked', s.name, r.returned_on::text, r.amount_cents, count(*) over ()::int
			from payment_returns r join payments p on p.producer_id = r.producer_id and p.id = r.payment_id
			join stores s on s.producer_id = p.producer_id and s.id = p.store_id
			where r.producer_id = ${producerId} and r.state = 'asked' and r.returned_on <= ${until}::date
			order by r.returned_on, r.id limit ${NAMED})
			union all
			(select 'stripe-differs', d.stripe_id, (d.found_at at time zone ${timeZone})::date::text, coalesce(d.their_cents, d.our_cents), count(*) over ()::int
			from stripe_differences d where d.producer_id = ${producerId} and d.settled_at is null
			order by d.found_at, d.id limit ${NAMED})
			union all
			(select 'market-open', k.name, d.market_on::text, null, count(*) over ()::int
			from market_days d join markets k on k.producer_id = d.producer_id and k.id = d.market_id
			where d.producer_id = ${producerId} and d.state = 'open' and d.market_on <= ${until}::date
			order by d.market_on, d.id limit ${NAMED})
		) as open`)
	const kinds = [...new Set(rows.map(({ of }) => of))]
	return kinds.map((of) => {
		const ofKind = rows.filter((row) => row.of === of)
		return {
			of,
			count: ofKind[0]?.count ?? 0,
			examples: ofKind.map(({ words, on, cents }) => ({ words, on, cents })),
		}
	})
}
