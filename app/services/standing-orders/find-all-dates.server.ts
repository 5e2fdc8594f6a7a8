import { type SQL, sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { type DeliverySchedule, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { readStandingOrders, type StandingOrder } from "./read-standing-orders.server"
import { type DueDate, newDateMemory, standingDates } from "./standing-dates.server"

/** Dates of one standing order whose cut-off can have passed while the delivery is still to come. */
const DATES_WITHIN_A_FORTNIGHT = 15

/** A standing order with its next dates, those that have closed among them, by the days on which its store is served. */
type StandingDates = { standing: StandingOrder; dates: DueDate[]; schedule: DeliverySchedule }

/** The next dates of all standing orders of a producer that meet `condition` (on `so`), in four statements. */
export async function findAllDates(
	tx: Tx,
	query: { producerId: string; now: Date; condition: SQL },
): Promise<StandingDates[]> {
	const { producerId, now, condition } = query
	const { rows } = await tx.execute<{ time_zone: string }>(
		sql`select time_zone from producers where id = ${producerId}`,
	)
	const zone = rows[0]?.time_zone
	if (zone === undefined) return []
	const standingOrders = await readStandingOrders(tx, producerId, condition)
	if (standingOrders.length === 0) return []
	const all = await findDeliverySchedule(tx, { producerId, storeId: null, now, zone })
	const weekdays = await findStoreWeekdays(tx, producerId)
	const memory = newDateMemory()
	return standingOrders.map((standing) => {
		const stops = weekdays.get(standing.storeId) ?? []
		const schedule = { ...all, rounds: all.rounds.filter((round) => stops.includes(round.weekday)) }
		return { standing, schedule, dates: standingDates(standing, schedule, DATES_WITHIN_A_FORTNIGHT, memory) }
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
