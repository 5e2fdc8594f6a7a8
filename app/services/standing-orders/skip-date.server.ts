import { and, eq } from "drizzle-orm"
import { auditEntries, standingOrderSkips } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { findOpenDate } from "./find-open-date.server"

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
		const found = await findOpenDate(tx, query)
		if (!found.ok) return found
		const { standing, date } = found

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
