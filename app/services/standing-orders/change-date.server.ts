import { and, eq } from "drizzle-orm"
import { auditEntries, standingOrderChanges } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { findOpenDate } from "./find-open-date.server"

/**
 * Sets what the store asks on one date only, named by the rule; `cases` holds what is asked of each product that day, 0 for
 * none. A product at its usual, or left out, has no change that day; one that is not a line of the standing order is left
 * aside. Refused for a date that is not one of its next, and after last orders. Recorded with who and when.
 */
export function changeDate(query: {
	producerId: string
	storeId: string
	personId: string
	ruleOn: Day
	cases: readonly { productId: string; cases: number }[]
	now: Date
	zone: string
}): Promise<Result<{ deliveryOn: Day }, { ok: false; reason: "no-such-date" | "closed" }>> {
	const { producerId, ruleOn } = query
	return withProducer(producerId, async (tx) => {
		const found = await findOpenDate(tx, query)
		if (!found.ok) return found
		const { standing, date } = found
		const usual = new Map(standing.lines.map((line) => [line.productId, line.cases]))
		const changes = query.cases.filter(({ productId, cases }) => usual.has(productId) && usual.get(productId) !== cases)
		await tx
			.delete(standingOrderChanges)
			.where(
				and(
					eq(standingOrderChanges.producerId, producerId),
					eq(standingOrderChanges.standingOrderId, standing.id),
					eq(standingOrderChanges.changeOn, ruleOn),
				),
			)
		if (changes.length > 0) {
			await tx
				.insert(standingOrderChanges)
				.values(changes.map((change) => ({ producerId, standingOrderId: standing.id, changeOn: ruleOn, ...change })))
		}
		await tx.insert(auditEntries).values({
			producerId,
			at: query.now,
			userId: query.personId,
			action: "change-standing-date",
			subjectType: "standing-order",
			subjectId: standing.id,
			detail: { ruleOn, changes },
		})
		return { ok: true, deliveryOn: date.deliveryOn }
	})
}
