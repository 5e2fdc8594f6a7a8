import { and, eq, isNull } from "drizzle-orm"
import { orderLines, orders, outboxMails } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { findSharedSentences } from "~/services/sharing/find-shared-sentences.server"
import { confirmationKey } from "./confirm-order.server"
import { findMostCases } from "./find-most-cases.server"
import { type LockedOrder, lockOrder } from "./lock-order.server"
import { lockProducts } from "./lock-products.server"
import { findOpenProposal } from "./propose-change.server"
import { recordChange } from "./record-change.server"

export type Undoing = { ok: true } | { ok: false; reason: "no-such-order" | "not-confirmed" | "already-told" }

/**
 * Takes a confirmation back while none of its letters has gone: the order is placed again and the letters are taken out
 * of the outbox. A line that was shared out keeps what it got. A line whose asked cases have gone to others meanwhile is one to be shared out from then on, so that
 * nothing is promised twice. Afterwards a change is a new decision with its own letter.
 */
export async function undoConfirmation(query: {
	producer: { id: string; timeZone: string }
	number: number
	personId: string
}): Promise<Undoing> {
	const { producer, number, personId } = query
	const producerId = producer.id
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (order.state !== "confirmed") return { ok: false, reason: "not-confirmed" }
		const isLetter = and(eq(outboxMails.producerId, producerId), eq(outboxMails.onceKey, confirmationKey(order.id)))
		// Waits for a letter that is being sent this moment, then sees that it has gone.
		const letters = await tx.select({ sentAt: outboxMails.sentAt }).from(outboxMails).where(isLetter).for("update")
		if (letters.some(({ sentAt }) => sentAt !== null)) return { ok: false, reason: "already-told" }
		await tx.delete(outboxMails).where(and(isLetter, isNull(outboxMails.sentAt)))
		const proposal = await findOpenProposal(tx, { producerId, orderId: order.id })
		if (proposal) return { ok: false, reason: "already-told" }
		await takeBackGiven(tx, { producer, order })
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

async function takeBackGiven(
	tx: Tx,
	query: { producer: { id: string; timeZone: string }; order: LockedOrder },
): Promise<void> {
	const { producer, order } = query
	const { lines, deliveryOn } = order
	await lockProducts(tx, { producerId: producer.id, productIds: lines.map((line) => line.productId) })
	const today = dayInZone(now(), producer.timeZone)
	const shared = await findSharedSentences(tx, { producerId: producer.id, orderIds: [order.id] })
	const most = await findMostCases(tx, { producerId: producer.id, deliveryOn, today, lines })
	for (const line of lines) {
		const isToShare = line.isToShare || (most.get(line.id) ?? 0) < line.askedCases
		await tx
			.update(orderLines)
			.set({ givenCases: shared.get(line.id)?.given ?? null, isToShare })
			.where(and(eq(orderLines.producerId, producer.id), eq(orderLines.id, line.id)))
	}
}
