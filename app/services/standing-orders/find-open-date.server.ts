import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { readStoreStandingOrder, type StandingOrder } from "./read-standing-orders.server"
import { type DueDate, standingDates } from "./standing-dates.server"

/** How far ahead a date can be skipped or changed: what a season of weekly deliveries holds. */
const DATES_AHEAD = 60

/**
 * The store's standing order and one of its next dates, named by the rule, while that can still be changed. The store's row
 * is locked first, as setting the standing order locks it: what is said of a date is not lost to a save at the same time.
 */
export async function findOpenDate(
	tx: Tx,
	query: { producerId: string; storeId: string; ruleOn: Day; now: Date; zone: string },
): Promise<Result<{ standing: StandingOrder; date: DueDate }, { ok: false; reason: "no-such-date" | "closed" }>> {
	const { producerId, storeId, ruleOn } = query
	await tx.execute(sql`select id from stores where producer_id = ${producerId} and id = ${storeId} for no key update`)
	const standing = await readStoreStandingOrder(tx, query)
	if (!standing) return { ok: false, reason: "no-such-date" }
	const schedule = await findDeliverySchedule(tx, query)
	const date = standingDates(standing, schedule, DATES_AHEAD).find((one) => one.ruleOn === ruleOn)
	if (!date) return { ok: false, reason: "no-such-date" }
	return date.isOpen ? { ok: true, standing, date } : { ok: false, reason: "closed" }
}
