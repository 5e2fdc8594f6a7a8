import { and, eq } from "drizzle-orm"
import { auditEntries, standingOrderSkips } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { readStoreStandingOrder } from "./read-standing-orders.server"
import { standingDates } from "./standing-dates.server"

/** How far ahead a date can be skipped: what a season of weekly deliveries holds. */
const DATES_AHEAD = 60

/**
 * Skips one date of the store's standing order, or puts it back. `ruleOn` names the date by the rule. Refused for a date
 * that is not one of its next, and after last orders; doing it twice is no refusal. Recorded with who and when.
 */
export function skipDate(query: {
	producerId: string
	storeId: string
	personId: string
	ruleOn: Day
	isSkipped: boolean
	now: Date
	zone: string
}): Promise<Result<{ deliveryOn: Day }, { ok: false; reason: "no-such-date" | "closed" }>> {
	const { producerId, ruleOn } = query
	return withProducer(producerId, async (tx) => {
		const standing = await readStoreStandingOrder(tx, query)
		if (!standing) return { ok: false, reason: "no-such-date" }
		const schedule = await findDeliverySchedule(tx, query)
		const date = standingDates(standing, schedule, DATES_AHEAD).find((one) => one.ruleOn === ruleOn)
		if (!date) return { ok: false, reason: "no-such-date" }
		if (!date.isOpen) return { ok: false, reason: "closed" }

		const skip = { producerId, standingOrderId: standing.id, skipOn: ruleOn }
		if (query.isSkipped) await tx.insert(standingOrderSkips).values(skip).onConflictDoNothing()
		else {
			await tx
				.delete(standingOrderSkips)
				.where(
					and(
						eq(standingOrderSkips.producerId, producerId),
						eq(standingOrderSkips.standingOrderId, standing.id),
						eq(standingOrderSkips.skipOn, ruleOn),
					),
				)
		}
		await tx.insert(auditEntries).values({
			producerId,
			at: query.now,
			userId: query.personId,
			action: query.isSkipped ? "skip-standing-date" : "put-back-standing-date",
			subjectType: "standing-order",
			subjectId: standing.id,
			detail: { ruleOn },
		})
		return { ok: true, deliveryOn: date.deliveryOn }
	})
}
