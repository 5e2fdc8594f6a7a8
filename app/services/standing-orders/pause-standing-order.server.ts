import { and, eq, sql } from "drizzle-orm"
import { auditEntries, standingOrderSkips, standingOrders } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { isWithinPause } from "~/domain/standing-orders/delivery-dates"
import { findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { readStoreStandingOrder, type StandingOrder } from "./read-standing-orders.server"
import { type DueDate, standingDates } from "./standing-dates.server"

/** Dates of one standing order whose cut-off can have passed while the delivery is still to come. */
const DATES_WITHIN_A_FORTNIGHT = 15

/** From the first to the last day without deliveries; no last day is until it is resumed. */
type Pause = { from: Day; until: Day | null }

/**
 * Pauses the store's standing order, or resumes it with `pause` null. A date whose last orders have passed stays as it was:
 * a pause that would reach one is refused, and one that closed within an earlier pause stays skipped. Refused also where
 * the last day lies before the first, and where there is no standing order. Recorded with who and when.
 */
export function pauseStandingOrder(query: {
	producerId: string
	storeId: string
	personId: string
	pause: Pause | null
	now: Date
	zone: string
}): Promise<Result<object, { ok: false; reason: "none" | "ends-before-start" | "closed" }>> {
	const { producerId, storeId, pause } = query
	if (pause?.until && pause.until < pause.from) return Promise.resolve({ ok: false, reason: "ends-before-start" })
	return withProducer(producerId, async (tx) => {
		await tx.execute(sql`select id from stores where producer_id = ${producerId} and id = ${storeId} for no key update`)
		const standing = await readStoreStandingOrder(tx, query)
		if (!standing) return { ok: false, reason: "none" }
		const schedule = await findDeliverySchedule(tx, query)
		const closed = standingDates(standing, schedule, DATES_WITHIN_A_FORTNIGHT).filter((date) => !date.isOpen)
		const reaches = (date: DueDate) =>
			pause !== null && isWithinPause({ pausedFrom: pause.from, pausedUntil: pause.until }, date.ruleOn)
		if (closed.some((date) => !date.isSkipped && reaches(date))) return { ok: false, reason: "closed" }
		await keepClosedSkipped(tx, producerId, standing, closed)
		await tx
			.update(standingOrders)
			.set({ pausedFrom: pause?.from ?? null, pausedUntil: pause?.until ?? null })
			.where(and(eq(standingOrders.producerId, producerId), eq(standingOrders.id, standing.id)))
		await tx.insert(auditEntries).values({
			producerId,
			at: query.now,
			userId: query.personId,
			action: pause ? "pause-standing-order" : "resume-standing-order",
			subjectType: "standing-order",
			subjectId: standing.id,
			detail: pause ?? {},
		})
		return { ok: true }
	})
}

/** Dates that closed within the pause so far are skipped on their own account: lifting it must not bring them back. */
async function keepClosedSkipped(
	tx: Tx,
	producerId: string,
	standing: StandingOrder,
	closed: readonly DueDate[],
): Promise<void> {
	const paused = closed.filter((date) => isWithinPause(standing, date.ruleOn))
	if (paused.length === 0) return
	await tx
		.insert(standingOrderSkips)
		.values(paused.map(({ ruleOn }) => ({ producerId, standingOrderId: standing.id, skipOn: ruleOn })))
		.onConflictDoNothing()
}
