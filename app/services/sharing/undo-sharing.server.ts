import { and, eq, inArray, isNull, sql } from "drizzle-orm"
import { orderLines, outboxMails, sharingRuns } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { lockProducts } from "~/services/orders/lock-products.server"
import { recordChange } from "~/services/orders/record-change.server"
import { sharedKey } from "./tell-stores.server"

export type UndoingSharing =
	| { ok: true }
	| { ok: false; reason: "no-such-run" | "undone-already" | "already-told" }
	| { ok: false; reason: "order-decided"; orderNumber: number }

type Share = {
	lineId: string
	orderId: string
	number: number
	state: string
	storeId: string
	addedLineId: string | null
}

/**
 * Takes a sharing back while none of its letters has gone and none of its orders has moved on: its lines wait to be
 * shared out again, what was added in place of them is taken off, and the letters are taken out of the outbox. The run
 * stays, marked as undone. Afterwards a change is a new decision with its own letter.
 */
export async function undoSharing(query: {
	producerId: string
	runId: string
	personId: string
}): Promise<UndoingSharing> {
	const { producerId, runId, personId } = query
	return withProducer(producerId, async (tx) => {
		const shares = await lockShares(tx, { producerId, runId })
		const [run] = await tx
			.select({ state: sharingRuns.state, productId: sharingRuns.productId })
			.from(sharingRuns)
			.where(and(eq(sharingRuns.producerId, producerId), eq(sharingRuns.id, runId)))
		if (!run) return { ok: false, reason: "no-such-run" }
		if (run.state === "undone") return { ok: false, reason: "undone-already" }
		const decided = shares.find(({ state }) => state !== "placed")
		if (decided) return { ok: false, reason: "order-decided", orderNumber: decided.number }
		if (!(await takeBackLetters(tx, { producerId, runId, shares }))) return { ok: false, reason: "already-told" }

		await lockProducts(tx, { producerId, productIds: [run.productId] })
		const lineIds = shares.map(({ lineId }) => lineId)
		await tx
			.update(orderLines)
			.set({ givenCases: null })
			.where(and(eq(orderLines.producerId, producerId), inArray(orderLines.id, lineIds)))
		const added = shares.flatMap(({ addedLineId }) => addedLineId ?? [])
		if (added.length > 0)
			await tx.delete(orderLines).where(and(eq(orderLines.producerId, producerId), inArray(orderLines.id, added)))
		await tx
			.update(sharingRuns)
			.set({ state: "undone" })
			.where(and(eq(sharingRuns.producerId, producerId), eq(sharingRuns.id, runId)))
		for (const orderId of new Set(shares.map((share) => share.orderId)))
			await recordChange(tx, {
				producerId,
				orderId,
				kind: "changed",
				userId: personId,
				detail: { undone: "sharing", runId },
			})
		return { ok: true }
	})
}

/** Locks the orders of a run, in the order of their ids, and answers what each line of it got. */
async function lockShares(tx: Tx, query: { producerId: string; runId: string }): Promise<Share[]> {
	const { rows } = await tx.execute<Share>(sql`
		select s.order_line_id as "lineId", o.id as "orderId", o.number, o.state, s.store_id as "storeId",
			(select e.detail->>'addedLineId' from order_events e
				where e.producer_id = o.producer_id and e.order_id = o.id and e.kind = 'shared'
					and e.detail->>'runId' = ${query.runId} and e.detail->>'lineId' = s.order_line_id::text) as "addedLineId"
		from sharing_shares s
		join order_lines l on l.producer_id = s.producer_id and l.id = s.order_line_id
		join orders o on o.producer_id = l.producer_id and o.id = l.order_id
		where s.producer_id = ${query.producerId} and s.run_id = ${query.runId}
		order by o.id for update of o`)
	return rows
}

/** Takes the letters of a run out of the outbox; false, with nothing taken, when one of them has gone. */
async function takeBackLetters(
	tx: Tx,
	query: { producerId: string; runId: string; shares: readonly Share[] },
): Promise<boolean> {
	const keys = [...new Set(query.shares.map(({ storeId }) => sharedKey(query.runId, storeId)))]
	const isLetter = and(eq(outboxMails.producerId, query.producerId), inArray(outboxMails.onceKey, keys))
	// Waits for a letter that is being sent this moment, then sees that it has gone.
	const letters = await tx.select({ sentAt: outboxMails.sentAt }).from(outboxMails).where(isLetter).for("update")
	if (letters.some(({ sentAt }) => sentAt !== null)) return false
	await tx.delete(outboxMails).where(and(isLetter, isNull(outboxMails.sentAt)))
	return true
}
