import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { compareDays, type Day } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { wholeCases } from "~/domain/quantity"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { findAllDates } from "./find-all-dates.server"
import { type Due, makeOrders } from "./make-orders.server"

/** So many orders are written in one transaction: the fewer, the sooner others get at the same products. */
const AT_ONCE = 40

/**
 * Makes the orders of all standing orders of a producer whose last orders have passed and whose delivery is not past: each
 * date once and only once, however many run this at a time and however late. Where a product does not reach for all that
 * close for a day together, all of them are to share it, whichever is written first; a product no longer sold is left out.
 * Orders are written in small batches; what another worker has in hand is passed over at first and waited for in the end.
 * In a batch that fails each order is tried by itself, so that one that fails leaves the others; the first failure is thrown
 * at the end. Returns how many orders were made.
 */
export async function makeDueOrders(query: { producerId: string; now: Date }): Promise<{ made: number }> {
	const first = await makeAll(query, false)
	const second = first.passedOver > 0 ? await makeAll(query, true) : first
	const failures = [...first.failures, ...second.failures]
	if (failures.length > 0) throw failures[0]
	return { made: first.made + (second === first ? 0 : second.made) }
}

type Made = { made: number; passedOver: number; failures: unknown[] }

async function makeAll(query: { producerId: string; now: Date }, waits: boolean): Promise<Made> {
	const { producerId } = query
	const due = await readProducer(producerId, (tx) => findDue(tx, query))
	const all: Made = { made: 0, passedOver: 0, failures: [] }
	for (const day of new Set(due.map(({ date }) => date.deliveryOn))) {
		const ofDay = due.filter(({ date }) => date.deliveryOn === day)
		const short = await readProducer(producerId, (tx) => findShort(tx, producerId, ofDay))
		for (let from = 0; from < ofDay.length; from += AT_ONCE) {
			const batch = await makeBatch(producerId, { due: ofDay.slice(from, from + AT_ONCE), short, waits })
			all.made += batch.made
			all.passedOver += batch.passedOver
			all.failures.push(...batch.failures)
		}
	}
	return all
}

type Batch = { due: Due[]; short: ReadonlySet<string>; waits: boolean }

async function makeBatch(producerId: string, batch: Batch): Promise<Made> {
	try {
		return { ...(await makeOrders(producerId, batch)), failures: [] }
	} catch (error) {
		if (batch.due.length === 1) return { made: 0, passedOver: 0, failures: [error] }
		const all: Made = { made: 0, passedOver: 0, failures: [] }
		for (const one of batch.due) {
			const alone = await makeBatch(producerId, { ...batch, due: [one] })
			all.made += alone.made
			all.passedOver += alone.passedOver
			all.failures.push(...alone.failures)
		}
		return all
	}
}

async function findDue(tx: Tx, query: { producerId: string; now: Date }): Promise<Due[]> {
	// One that ended lately may have a date that closed before its end and is not made yet.
	const since = query.now.toISOString()
	const all = await findAllDates(tx, {
		...query,
		condition: sql`(so.ended_at is null or so.ended_at > ${since}::timestamptz - interval '15 days')`,
	})
	const [first] = all
	if (!first) return []
	const made = await findMade(tx, { producerId: query.producerId, from: first.schedule.today })
	return all
		.flatMap(({ standing, dates, schedule }) =>
			dates
				.filter((date) => !date.isOpen && !date.isSkipped && !made.has(`${standing.id} ${date.ruleOn}`))
				.map((date) => ({ standing, date, schedule })),
		)
		.toSorted((a, b) => compareDays(a.date.deliveryOn, b.date.deliveryOn))
}

/**
 * The products of which less is free than these dates of one day ask together, with what waits already to be shared out of
 * the orders that standing orders have made for it: a run that was cut short is finished as it was begun.
 */
async function findShort(tx: Tx, producerId: string, due: readonly Due[]): Promise<Set<string>> {
	const [first] = due
	if (!first) return new Set()
	const { deliveryOn } = first.date
	const asked = new Map<string, number>()
	const add = (productId: string, cases: number) => asked.set(productId, (asked.get(productId) ?? 0) + cases)
	for (const { standing, date } of due) {
		for (const line of linesOnDate(standing.lines, standing.changes, date.ruleOn)) add(line.productId, line.cases)
	}
	for (const { productId, cases } of await findWaiting(tx, producerId, deliveryOn)) add(productId, cases)
	const outlooks = await findOutlooks(tx, {
		producerId,
		today: first.schedule.today,
		productIds: [...asked.keys()],
	})
	const isShort = ([productId, cases]: [string, number]) => {
		const outlook = outlooks.get(productId)
		if (!outlook) return false
		const free = freeToPromise({ ...outlook, days: [deliveryOn] })[0]?.free ?? 0
		return cases > wholeCases(free, outlook.piecesPerCase)
	}
	return new Set([...asked].filter(isShort).map(([productId]) => productId))
}

/** Cases of orders that standing orders have made for a day which wait to be shared out. */
async function findWaiting(
	tx: Tx,
	producerId: string,
	deliveryOn: Day,
): Promise<{ productId: string; cases: number }[]> {
	const { rows } = await tx.execute<{ productId: string; cases: number }>(sql`
		select l.product_id as "productId", sum(l.asked_cases - l.promised_cases)::int as cases
		from orders o
		join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
		where o.producer_id = ${producerId} and o.delivery_on = ${deliveryOn} and o.state = 'placed'
			and o.standing_order_id is not null and l.is_to_share and l.given_cases is null
		group by 1`)
	return rows
}

async function findMade(tx: Tx, query: { producerId: string; from: Day }): Promise<Set<string>> {
	const { rows } = await tx.execute<{ standing_order_id: string; standing_on: Day }>(sql`
		select standing_order_id, standing_on::text from orders
		where producer_id = ${query.producerId} and delivery_on >= ${query.from} and standing_order_id is not null`)
	return new Set(rows.map((row) => `${row.standing_order_id} ${row.standing_on}`))
}
