import { and, eq } from "drizzle-orm"
import { auditEntries, orderMessages, orders, stores } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findDeskPeople, findStorePeople } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

/** Who writes: someone of the producer's desk, or of the store that ordered. */
export type Writer =
	| { side: "desk"; person: { id: string; name: string } }
	| { side: "store"; storeId: string; person: { id: string; name: string } }

export type Written = { ok: true; messageId: string } | { ok: false; reason: "no-such-order" | "key-of-another" }

/**
 * Writes to the other side about an order, in any of its states; what is written stays. The other side's people get it by
 * letter at once: a message is no decision that could be taken back. The same form sent again is the same message.
 */
export function writeMessage(query: {
	producer: { id: string; slug: string; name: string }
	number: number
	writer: Writer
	/** 1 to 2,000 characters, trimmed. */
	body: string
	idempotencyKey: string
}): Promise<Written> {
	const { producer, number, writer, body, idempotencyKey } = query
	const producerId = producer.id
	return withProducer(producerId, async (tx) => {
		const [found] = await tx
			.select({ order: orders, store: stores })
			.from(orders)
			.innerJoin(stores, and(eq(stores.producerId, orders.producerId), eq(stores.id, orders.storeId)))
			.where(and(eq(orders.producerId, producerId), eq(orders.number, number)))
		if (!found || (writer.side === "store" && found.order.storeId !== writer.storeId))
			return { ok: false, reason: "no-such-order" }
		const orderId = found.order.id
		const [made] = await tx
			.insert(orderMessages)
			.values({ producerId, orderId, side: writer.side, body, writtenBy: writer.person.id, idempotencyKey })
			.onConflictDoNothing({ target: [orderMessages.producerId, orderMessages.idempotencyKey] })
			.returning({ id: orderMessages.id })
		if (!made) return earlier(tx, { producerId, orderId, writer, idempotencyKey })
		await tx.insert(auditEntries).values({
			producerId,
			userId: writer.person.id,
			action: "order message",
			subjectType: "order",
			subjectId: orderId,
			detail: { messageId: made.id, side: writer.side },
		})
		await tell(tx, { ...query, ...found, messageId: made.id })
		return { ok: true, messageId: made.id }
	})
}

/** The message that was written with this key before; refused when another order or person used it. */
async function earlier(
	tx: Tx,
	query: { producerId: string; orderId: string; writer: Writer; idempotencyKey: string },
): Promise<Written> {
	const { producerId, orderId, writer, idempotencyKey } = query
	const [message] = await tx
		.select({ id: orderMessages.id, orderId: orderMessages.orderId, writtenBy: orderMessages.writtenBy })
		.from(orderMessages)
		.where(and(eq(orderMessages.producerId, producerId), eq(orderMessages.idempotencyKey, idempotencyKey)))
	const isSame = message?.orderId === orderId && message.writtenBy === writer.person.id
	return message && isSame ? { ok: true, messageId: message.id } : { ok: false, reason: "key-of-another" }
}

async function tell(
	tx: Tx,
	query: {
		producer: { id: string; slug: string; name: string }
		order: typeof orders.$inferSelect
		store: typeof stores.$inferSelect
		writer: Writer
		body: string
		messageId: string
	},
): Promise<void> {
	const { producer, order, store, writer, body, messageId } = query
	const producerId = producer.id
	const isFromDesk = writer.side === "desk"
	const people = isFromDesk
		? await findStorePeople(tx, { producerId, storeId: store.id, kind: "messages" })
		: await findDeskPeople(tx, { producerId })
	const page = isFromDesk ? `buy/${producer.slug}/${store.slug}` : `desk/${producer.slug}`
	const yard = letterHead(await findYard(tx, producerId))
	for (const { email } of people) {
		await queueMail(tx, {
			producerId,
			to: email,
			onceKey: `order-message:${messageId}`,
			template: "order-message",
			props: {
				yard,
				sentTo: email,
				storeName: store.name,
				orderNumber: String(order.number),
				deliveryOn: order.deliveryOn,
				orderUrl: `${env.BASE_URL}/${page}/orders/${order.number}`,
				writer: writer.person.name,
				from: isFromDesk ? producer.name : store.name,
				body,
			},
		})
	}
}
