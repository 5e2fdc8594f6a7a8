import { and, eq } from "drizzle-orm"
import { orderDrafts } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { findPlacingFacts } from "./find-placing-facts.server"

/** A sheet of two hundred products has some six hundred fields; none is longer than a note. */
const MOST_FIELDS = 2000
const LONGEST = 500
const KEPT = /^(?:cases-|least-|poNumber$|note$)/

/** What of a sheet's fields is worth keeping: figures, number and note that are not empty, each as it was typed. */
function draftFields(values: Readonly<Record<string, string>>): Record<string, string> {
	const kept = Object.entries(values).filter(
		([name, value]) => KEPT.test(name) && name.length < 60 && value.trim() !== "",
	)
	return Object.fromEntries(kept.slice(0, MOST_FIELDS).map(([name, value]) => [name, value.slice(0, LONGEST)]))
}

/**
 * Keeps a half-filled sheet for the store, in the place of what was kept for that day before, whoever wrote that: the last
 * to write wins. An empty sheet is not kept, and takes away what was; a sheet that has been sent meanwhile is not kept either.
 */
export async function keepDraft(draft: {
	producerId: string
	storeId: string
	deliveryOn: Day
	personId: string
	now: Date
	values: Readonly<Record<string, string>>
	/** That of the sheet's form: an order that was made of it needs no draft. */
	idempotencyKey: string
}): Promise<void> {
	const { producerId, storeId, deliveryOn, personId: updatedBy, now: updatedAt } = draft
	const fields = draftFields(draft.values)
	if (Object.keys(fields).length === 0) return dropDraft(draft)
	await withProducer(producerId, async (tx) => {
		const facts = { producerId, storeId, idempotencyKey: draft.idempotencyKey }
		if ((await findPlacingFacts(tx, facts)).earlier) return
		await tx
			.insert(orderDrafts)
			.values({ producerId, storeId, deliveryOn, fields, updatedBy, updatedAt })
			.onConflictDoUpdate({
				target: [orderDrafts.producerId, orderDrafts.storeId, orderDrafts.deliveryOn],
				set: { fields, updatedBy, updatedAt },
			})
	})
}

/** Throws the half-filled sheet of a day away, so that it is begun afresh. */
export async function dropDraft(draft: { producerId: string; storeId: string; deliveryOn: Day }): Promise<void> {
	await withProducer(draft.producerId, (tx) =>
		tx
			.delete(orderDrafts)
			.where(
				and(
					eq(orderDrafts.producerId, draft.producerId),
					eq(orderDrafts.storeId, draft.storeId),
					eq(orderDrafts.deliveryOn, draft.deliveryOn),
				),
			),
	)
}
