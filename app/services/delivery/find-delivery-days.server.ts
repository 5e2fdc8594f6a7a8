import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { addDays, type Day, dayInZone } from "~/domain/calendar"
import { type DeliveryDay, isOpen, nextDeliveryDays, type Round } from "~/domain/delivery/delivery-days"

/** When the van comes: the rounds in the order of the week, and the days from `today` on that are shut. */
export type DeliverySchedule = { rounds: Round[]; shutDays: Day[]; zone: string; today: Day; now: Date }

/** A delivery day as pages show it. */
export type OpenOrClosedDay = DeliveryDay & { isOpen: boolean }

type Row = { weekday: number; cutoff_days_before: number; cutoff_time: string; shut_days: Day[] }

/**
 * The rounds that stop at `storeId` (all of the producer's where it is null, as the desk sees them) and the shut days.
 * Shut days of the last weeks are among them, since a date that was shut may have moved to a day still to come.
 * One statement; a store on no round has an empty list.
 */
export async function findDeliverySchedule(
	tx: Tx,
	query: { producerId: string; storeId: string | null; now: Date; zone: string },
): Promise<DeliverySchedule> {
	const today = dayInZone(query.now, query.zone)
	const ofStore =
		query.storeId === null
			? sql``
			: sql`join store_rounds s on s.producer_id = r.producer_id and s.round_id = r.id and s.store_id = ${query.storeId}`
	const { rows } = await tx.execute<Row>(sql`
		select r.weekday, r.cutoff_days_before, r.cutoff_time::text, array(
			select d.shut_on::text from shut_days d
			where d.producer_id = ${query.producerId} and d.shut_on >= ${addDays(today, -60)}
			order by d.shut_on
		) as shut_days
		from delivery_rounds r ${ofStore}
		where r.producer_id = ${query.producerId}
		order by r.weekday`)
	return {
		rounds: rows.map((row) => ({
			weekday: row.weekday,
			cutoffDaysBefore: row.cutoff_days_before,
			cutoffTime: row.cutoff_time.slice(0, 5),
		})),
		shutDays: rows[0]?.shut_days ?? [],
		zone: query.zone,
		today,
		now: query.now,
	}
}

/** The next `count` delivery days of a schedule from today on, closed ones among them and marked. */
export function deliveryDaysOf(
	schedule: DeliverySchedule,
	count: number,
	from: Day = schedule.today,
): OpenOrClosedDay[] {
	const { rounds, shutDays, zone, now } = schedule
	return nextDeliveryDays({ rounds, shutDays, zone, from, count }).map((day) => ({ ...day, isOpen: isOpen(day, now) }))
}

/** The delivery day on `on`, past or to come, or null when the van does not come that day. */
export function deliveryDayOn(schedule: DeliverySchedule, on: Day): OpenOrClosedDay | null {
	const [day] = deliveryDaysOf(schedule, 1, on)
	return day?.on === on ? day : null
}

/** The next delivery days of one store, or of all rounds where `storeId` is null. */
export async function findDeliveryDays(
	tx: Tx,
	query: { producerId: string; storeId: string | null; now: Date; zone: string; count: number },
): Promise<OpenOrClosedDay[]> {
	return deliveryDaysOf(await findDeliverySchedule(tx, query), query.count)
}
