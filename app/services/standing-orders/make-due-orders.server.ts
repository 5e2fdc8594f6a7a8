import { createHash } from "node:crypto"
import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { readProducer, type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type DeliverySchedule, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { checkAsked } from "~/services/orders/check-asked.server"
import { findPlacingFacts } from "~/services/orders/find-placing-facts.server"
import { writeOrder } from "~/services/orders/write-order.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { readStandingOrders, type StandingOrder } from "./read-standing-orders.server"
import { type DueDate, standingDates } from "./standing-dates.server"

/** Dates of one standing order whose cut-off can have passed while the delivery is still to come. */
const DATES_WITHIN_A_FORTNIGHT = 15

/**
 * Makes the orders of all standing orders of a producer whose last orders have passed and whose delivery is not past: each
 * date once and only once, however many run this at a time and however late. What is beyond the free is asked all the
 * same, to be shared out; a product no longer sold is left out. Each order is a transaction of its own, so that one that
 * fails leaves the others; the first failure is thrown at the end. Returns how many orders were made.
 */
export async function makeDueOrders(query: { producerId: string; now: Date }): Promise<{ made: number }> {
	const due = await readProducer(query.producerId, (tx) => findDue(tx, query))
	const failures: unknown[] = []
	let made = 0
	for (const one of due) {
		try {
			if (await makeOrder(query.producerId, one)) made += 1
		} catch (error) {
			failures.push(error)
		}
	}
	if (failures.length > 0) throw failures[0]
	return { made }
}

type Due = { standing: StandingOrder; date: DueDate; schedule: DeliverySchedule }

async function findDue(tx: Tx, query: { producerId: string; now: Date }): Promise<Due[]> {
	const { producerId, now } = query
	const { rows } = await tx.execute<{ time_zone: string }>(
		sql`select time_zone from producers where id = ${producerId}`,
	)
	const zone = rows[0]?.time_zone
	if (zone === undefined) return []
	// One that ended lately may have a date that closed before its end and is not made yet.
	const standingOrders = await readStandingOrders(
		tx,
		producerId,
		sql`(so.ended_at is null or so.ended_at > ${now.toISOString()}::timestamptz - interval '15 days')`,
	)
	if (standingOrders.length === 0) return []
	const all = await findDeliverySchedule(tx, { producerId, storeId: null, now, zone })
	const weekdays = await findStoreWeekdays(tx, producerId)
	const made = await findMade(tx, { producerId, from: all.today })
	return standingOrders.flatMap((standing) => {
		const stops = weekdays.get(standing.storeId) ?? []
		const schedule = { ...all, rounds: all.rounds.filter((round) => stops.includes(round.weekday)) }
		return standingDates(standing, schedule, DATES_WITHIN_A_FORTNIGHT)
			.filter((date) => !date.isOpen && !date.isSkipped && !made.has(`${standing.id} ${date.ruleOn}`))
			.map((date) => ({ standing, date, schedule }))
	})
}

async function findStoreWeekdays(tx: Tx, producerId: string): Promise<Map<string, number[]>> {
	const { rows } = await tx.execute<{ store_id: string; weekdays: number[] }>(sql`
		select s.store_id, array_agg(r.weekday::int) as weekdays
		from store_rounds s
		join delivery_rounds r on r.producer_id = s.producer_id and r.id = s.round_id
		where s.producer_id = ${producerId}
		group by s.store_id`)
	return new Map(rows.map((row) => [row.store_id, row.weekdays]))
}

async function findMade(tx: Tx, query: { producerId: string; from: Day }): Promise<Set<string>> {
	const { rows } = await tx.execute<{ standing_order_id: string; standing_on: Day }>(sql`
		select standing_order_id, standing_on::text from orders
		where producer_id = ${query.producerId} and delivery_on >= ${query.from} and standing_order_id is not null`)
	return new Set(rows.map((row) => `${row.standing_order_id} ${row.standing_on}`))
}

/** True when this call made the order; false when it was there already, or when nothing it asks for is sold. */
async function makeOrder(producerId: string, { standing, date, schedule }: Due): Promise<boolean> {
	const { storeId } = standing
	const idempotencyKey = keyOf(standing.id, date.ruleOn)
	try {
		return await withProducer(producerId, async (tx) => {
			const { today, now } = schedule
			const productIds = standing.lines.map((line) => line.productId)
			const products = await findStorePrices(tx, { producerId, storeId, today, productIds, lock: true })
			const facts = await findPlacingFacts(tx, { producerId, storeId, idempotencyKey })
			if (facts.earlier) return false
			const { lines } = await checkAsked(tx, {
				producerId,
				today,
				deliveryOn: date.deliveryOn,
				asked: standing.lines.map(({ productId, cases }) => ({ productId, cases, keep: true })),
				products,
			})
			if (lines.length === 0) return false
			await writeOrder(tx, {
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
			return true
		})
	} catch (error) {
		if (breaksConstraint(error, "orders_sent_once") || breaksConstraint(error, "orders_one_per_standing_date")) {
			return false
		}
		throw error
	}
}

/** A key that is the same for the same date of the same standing order, in the form of a UUID (RFC 9562, version 8). */
function keyOf(standingOrderId: string, ruleOn: Day): string {
	const hex = createHash("sha256").update(`${standingOrderId} ${ruleOn}`).digest("hex")
	return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}
