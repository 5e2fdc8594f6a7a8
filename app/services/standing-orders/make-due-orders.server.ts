import { createHash } from "node:crypto"
import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { readProducer, type Tx, withProducer } from "~/db/transaction.server"
import { compareDays, type Day } from "~/domain/calendar"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { wholeCases } from "~/domain/quantity"
import { linesOnDate } from "~/domain/standing-orders/lines-on-date"
import type { DeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { checkAsked } from "~/services/orders/check-asked.server"
import { findPlacingFacts } from "~/services/orders/find-placing-facts.server"
import { writeOrder } from "~/services/orders/write-order.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { findAllDates } from "./find-all-dates.server"
import type { StandingOrder } from "./read-standing-orders.server"
import type { DueDate } from "./standing-dates.server"

/**
 * Makes the orders of all standing orders of a producer whose last orders have passed and whose delivery is not past: each
 * date once and only once, however many run this at a time and however late. Where a product does not reach for all that
 * close for a day together, all of them are to share it, whichever is written first; a product no longer sold is left out. Each order is a transaction of its own, so that one that
 * fails leaves the others; the first failure is thrown at the end. Returns how many orders were made.
 */
export async function makeDueOrders(query: { producerId: string; now: Date }): Promise<{ made: number }> {
	const due = await readProducer(query.producerId, (tx) => findDue(tx, query))
	const failures: unknown[] = []
	let made = 0
	for (const day of new Set(due.map(({ date }) => date.deliveryOn))) {
		const ofDay = due.filter(({ date }) => date.deliveryOn === day)
		const short = await readProducer(query.producerId, (tx) => findShort(tx, query.producerId, ofDay))
		for (const one of ofDay) {
			try {
				if (await makeOrder(query.producerId, one, short)) made += 1
			} catch (error) {
				failures.push(error)
			}
		}
	}
	if (failures.length > 0) throw failures[0]
	return { made }
}

type Due = { standing: StandingOrder; date: DueDate; schedule: DeliverySchedule }

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

/** True when this call made the order; false when it was there already, or when nothing it asks for is sold. */
async function makeOrder(
	producerId: string,
	{ standing, date, schedule }: Due,
	short: ReadonlySet<string>,
): Promise<boolean> {
	const { storeId } = standing
	const idempotencyKey = keyOf(standing.id, date.ruleOn)
	const asked = linesOnDate(standing.lines, standing.changes, date.ruleOn)
	if (asked.length === 0) return false
	try {
		return await withProducer(producerId, async (tx) => {
			const { today, now } = schedule
			const productIds = asked.map((line) => line.productId)
			const products = await findStorePrices(tx, { producerId, storeId, today, productIds, lock: true })
			const facts = await findPlacingFacts(tx, { producerId, storeId, idempotencyKey })
			if (facts.earlier) return false
			const { lines } = await checkAsked(tx, {
				producerId,
				today,
				deliveryOn: date.deliveryOn,
				asked: asked.map(({ productId, cases, leastCases }) => {
					const keep = short.has(productId) ? "share" : true
					return { productId, cases, leastCases, keep }
				}),
				products,
			})
			if (lines.length === 0) return false
			const { id } = await writeOrder(tx, {
				producerId,
				storeId,
				facts,
				deliveryOn: date.deliveryOn,
				lines,
				poNumber: "",
				note: "",
				idempotencyKey,
				placedAt: now,
				placedBy: null,
				standing: { standingOrderId: standing.id, on: date.ruleOn },
				acknowledgeTo: standing.createdBy.email,
				openUntil: null,
			})
			await copySubstitutes(tx, { producerId, orderId: id, standingOrderId: standing.id })
			return true
		})
	} catch (error) {
		if (breaksConstraint(error, "orders_sent_once") || breaksConstraint(error, "orders_one_per_standing_date")) {
			return false
		}
		throw error
	}
}

/** The order's lines take over what may stand in for them, for the sharing out that may follow. */
async function copySubstitutes(
	tx: Tx,
	query: { producerId: string; orderId: string; standingOrderId: string },
): Promise<void> {
	await tx.execute(sql`
		update order_lines set substitute_ids = usual.substitute_ids
		from standing_order_lines usual
		where order_lines.producer_id = ${query.producerId} and order_lines.order_id = ${query.orderId}
			and usual.producer_id = order_lines.producer_id and usual.standing_order_id = ${query.standingOrderId}
			and usual.product_id = order_lines.product_id and usual.substitute_ids <> '{}'`)
}

/** A key that is the same for the same date of the same standing order, in the form of a UUID (RFC 9562, version 8). */
function keyOf(standingOrderId: string, ruleOn: Day): string {
	const hex = createHash("sha256").update(`${standingOrderId} ${ruleOn}`).digest("hex")
	return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}
