import type { Tx } from "~/db/transaction.server"
import { type LateLine, lateLineWords, lateSums } from "~/domain/orders/late-change"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { LockedOrder } from "./lock-order.server"
import { findDeskPeople, findStorePeople } from "./order-people.server"

type Told = {
	producer: { id: string; slug: string }
	order: LockedOrder
	/** Names the event: the letter goes once. */
	key: string
	reason: string
	lines: readonly LateLine[]
}

/** Names the letters of a proposal in the outbox, so that taking it back can take them back. */
export const proposalKey = (proposalId: string) => `order-proposal:${proposalId}`

/** Tells the store's people of a late change: proposed, applied at once, or taken back after they were told. */
export async function tellStoreOfChange(
	tx: Tx,
	query: Told & { what: "proposed" | "applied" | "taken-back" },
): Promise<void> {
	const { producer, order, key, what } = query
	const people = await findStorePeople(tx, { producerId: producer.id, storeId: order.storeId, kind: "changes" })
	const facts = await factsOf(tx, query)
	const orderUrl = `${env.BASE_URL}/buy/${producer.slug}/${order.store.slug}/orders/${order.number}`
	for (const { email } of people) {
		const props = { ...facts, sentTo: email, orderUrl }
		const queued = { producerId: producer.id, to: email, delaySeconds: env.UNDO_SECONDS }
		await queueMail(
			tx,
			what === "proposed"
				? { ...queued, onceKey: proposalKey(key), template: "order-proposal", props }
				: { ...queued, onceKey: `order-changed:${what}:${key}`, template: "order-changed", props: { ...props, what } },
		)
	}
}

/** Tells the producer's desk what the store has answered. */
export async function tellDeskOfAnswer(
	tx: Tx,
	query: Told & { answer: "accepted" | "declined"; answeredBy: string },
): Promise<void> {
	const { producer, order, key, answer, answeredBy } = query
	const facts = await factsOf(tx, query)
	for (const { email } of await findDeskPeople(tx, { producerId: producer.id })) {
		await queueMail(tx, {
			producerId: producer.id,
			to: email,
			onceKey: `order-answer:${key}`,
			template: "order-answer",
			props: {
				...facts,
				sentTo: email,
				orderUrl: `${env.BASE_URL}/desk/${producer.slug}/orders/${order.number}`,
				answer,
				answeredBy,
			},
		})
	}
}

async function factsOf(tx: Tx, { producer, order, reason, lines }: Told) {
	return {
		yard: letterHead(await findYard(tx, producer.id)),
		storeName: order.store.name,
		orderNumber: String(order.number),
		deliveryOn: order.deliveryOn,
		reason,
		lines: lines.map((line) => {
			const product = order.lines.find(({ id }) => id === line.lineId)?.product
			return { productName: product?.name ?? "", productNote: product?.detail || null, change: lateLineWords(line) }
		}),
		...lateSums(lines),
	}
}
