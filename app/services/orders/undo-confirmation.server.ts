import { and, eq, isNull } from "drizzle-orm"
import { orderLines, orders, outboxMails } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { confirmationKey } from "./confirm-order.server"
import { lockOrder } from "./lock-order.server"
import { recordChange } from "./record-change.server"

export type Undoing = { ok: true } | { ok: false; reason: "no-such-order" | "not-confirmed" | "already-told" }

/**
 * Takes a confirmation back while none of its letters has gone: the order is placed again and the letters are taken out
 * of the outbox. Afterwards a change is a new decision with its own letter.
 */
export async function undoConfirmation(query: {
	producerId: string
	number: number
	personId: string
}): Promise<Undoing> {
	const { producerId, number, personId } = query
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (order.state !== "confirmed") return { ok: false, reason: "not-confirmed" }
		const isLetter = and(eq(outboxMails.producerId, producerId), eq(outboxMails.onceKey, confirmationKey(order.id)))
		// Waits for a letter that is being sent this moment, then sees that it has gone.
		const letters = await tx.select({ sentAt: outboxMails.sentAt }).from(outboxMails).where(isLetter).for("update")
		if (letters.some(({ sentAt }) => sentAt !== null)) return { ok: false, reason: "already-told" }
		await tx.delete(outboxMails).where(and(isLetter, isNull(outboxMails.sentAt)))
		await tx
			.update(orderLines)
			.set({ givenCases: null })
			.where(and(eq(orderLines.producerId, producerId), eq(orderLines.orderId, order.id)))
		await tx
			.update(orders)
			.set({ state: "placed" })
			.where(and(eq(orders.producerId, producerId), eq(orders.id, order.id)))
		await recordChange(tx, {
			producerId,
			orderId: order.id,
			kind: "placed",
			userId: personId,
			detail: { undone: "confirmation" },
		})
		return { ok: true }
	})
}
