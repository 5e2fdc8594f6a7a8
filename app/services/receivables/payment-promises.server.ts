import { and, eq } from "drizzle-orm"
import { auditEntries, paymentPromises } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

type By = { producerId: string; storeId: string; personId: string; promiseId: string }

/** Notes what a store has said it will pay, and when. `promiseId` is made with the form: sent twice it is noted once. */
export function notePromise(query: By & { amountCents: number; promisedOn: Day; note: string }): Promise<void> {
	const { producerId, storeId, personId, promiseId, amountCents, promisedOn, note } = query
	return withProducer(producerId, async (tx) => {
		const noted = await tx
			.insert(paymentPromises)
			.values({ producerId, id: promiseId, storeId, amountCents, promisedOn, note, notedBy: personId })
			.onConflictDoNothing()
			.returning({ id: paymentPromises.id })
		if (noted.length === 0) return
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "promise to pay noted",
			subjectType: "store",
			subjectId: storeId,
			detail: { promiseId, amountCents, promisedOn, note },
		})
	})
}

/** Says whether a promise was kept, as a person judges it; it can be judged again. A promise that is not there is left. */
export function judgePromise(query: By & { state: "kept" | "broken" }): Promise<void> {
	const { producerId, storeId, personId, promiseId, state } = query
	return withProducer(producerId, async (tx) => {
		const judged = await tx
			.update(paymentPromises)
			.set({ state })
			.where(
				and(
					eq(paymentPromises.producerId, producerId),
					eq(paymentPromises.storeId, storeId),
					eq(paymentPromises.id, promiseId),
				),
			)
			.returning({ id: paymentPromises.id })
		if (judged.length === 0) return
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: `promise to pay ${state}`,
			subjectType: "store",
			subjectId: storeId,
			detail: { promiseId },
		})
	})
}
