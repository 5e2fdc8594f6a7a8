import { and, eq, sql } from "drizzle-orm"
import { orders } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { canMove } from "~/domain/orders/order-states"
import { shortSentence } from "~/domain/orders/short-sentence"
import { freeToPromise } from "~/domain/promise/free-to-promise"
import { now } from "~/platform/clock.server"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { type LockedOrder, lockOrder } from "./lock-order.server"
import { lockProducts } from "./lock-products.server"
import { findStorePeople } from "./order-people.server"
import { recordChange } from "./record-change.server"

/** What the producer gives of one line, and why it is less than asked (empty: the plain sentence). */
export type GivenLine = { lineId: string; cases: number; reason: string }

export type Confirmation =
	| { ok: true }
	| { ok: false; reason: "no-such-order" | "nothing-given" }
	| { ok: false; reason: "not-placed"; state: string }
	| { ok: false; reason: "more-than-asked" | "more-than-free"; lineId: string; mostCases: number }

/**
 * Confirms an order with what can be given of each line; lines not named get all that was asked. Refused, with the line
 * and the most that it can get, when more is given than was asked or than is free for the day besides all other
 * promises. Tells the store's people once, after the time in which the decision can be undone.
 */
export async function confirmOrder(query: {
	producer: { id: string; slug: string; timeZone: string }
	number: number
	personId: string
	given: readonly GivenLine[]
}): Promise<Confirmation> {
	const { producer, number, personId } = query
	return withProducer(producer.id, async (tx) => {
		const order = await lockOrder(tx, { producerId: producer.id, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (!canMove(order.state, "confirmed")) return { ok: false, reason: "not-placed", state: order.state }
		const lines = order.lines.map((line) => {
			const given = query.given.find(({ lineId }) => lineId === line.id)
			return { ...line, cases: given?.cases ?? line.askedCases, reason: given?.reason ?? "" }
		})
		if (lines.every((line) => line.cases === 0)) return { ok: false, reason: "nothing-given" }
		const over = lines.find((line) => line.cases > line.askedCases)
		if (over) return { ok: false, reason: "more-than-asked", lineId: over.id, mostCases: over.askedCases }
		const most = await mostCases(tx, { producer, order })
		const beyond = lines.find((line) => line.cases > (most.get(line.id) ?? 0))
		if (beyond)
			return {
				ok: false,
				reason: "more-than-free",
				lineId: beyond.id,
				mostCases: Math.max(0, most.get(beyond.id) ?? 0),
			}

		await tx.execute(sql`
			update order_lines set given_cases = given.cases
			from unnest(${sql.param(lines.map(({ id }) => id))}::uuid[], ${sql.param(lines.map(({ cases }) => cases))}::int[]) as given(id, cases)
			where order_lines.producer_id = ${producer.id} and order_lines.id = given.id`)
		await tx
			.update(orders)
			.set({ state: "confirmed" })
			.where(and(eq(orders.producerId, producer.id), eq(orders.id, order.id)))
		const told = lines.map((line) => ({
			productName: line.product.name,
			productNote: line.product.detail || null,
			casesAsked: line.askedCases,
			casesGiven: line.cases,
			priceCents: line.caseCents,
			amountCents: line.cases * line.caseCents,
			reason:
				line.cases < line.askedCases
					? shortSentence({
							productName: line.product.name,
							asked: line.askedCases,
							given: line.cases,
							deliveryOn: order.deliveryOn,
							reason: line.reason,
						})
					: null,
		}))
		const shortNote = told.flatMap(({ reason }) => reason ?? []).join(" ")
		await recordChange(tx, {
			producerId: producer.id,
			orderId: order.id,
			kind: "confirmed",
			userId: personId,
			detail: { shortNote },
		})
		await tellStore(tx, { producer, order, lines: told })
		return { ok: true }
	})
}

/** The most cases each line can get, by line id: what is free for the day with this order's own promises set aside. */
async function mostCases(
	tx: Tx,
	query: { producer: { id: string; timeZone: string }; order: LockedOrder },
): Promise<Map<string, number>> {
	const { producer, order } = query
	const productIds = order.lines.map((line) => line.productId)
	await lockProducts(tx, { producerId: producer.id, productIds })
	const today = dayInZone(now(), producer.timeZone)
	const outlooks = await findOutlooks(tx, { producerId: producer.id, today, productIds })
	return new Map(
		order.lines.map((line) => {
			const outlook = outlooks.get(line.productId)
			if (!outlook) return [line.id, 0]
			const own = (line.isToShare ? 0 : line.askedCases) * line.piecesPerCase
			// ISO days sort as text; an overdue delivery counts as due today.
			const [, on = today] = [order.deliveryOn, today].toSorted()
			const promises = [...outlook.promises, { on, quantity: -own }]
			const raw = freeToPromise({ ...outlook, promises, days: [on] })[0]?.raw ?? 0
			return [line.id, Math.floor(raw / line.piecesPerCase)]
		}),
	)
}

async function tellStore(
	tx: Tx,
	query: {
		producer: { id: string; slug: string }
		order: LockedOrder
		lines: { productName: string; casesAsked: number; casesGiven: number; priceCents: number; amountCents: number }[]
	},
): Promise<void> {
	const { producer, order, lines } = query
	const yard = letterHead(await findYard(tx, producer.id))
	const goodsCents = lines.reduce((sum, line) => sum + line.amountCents, 0)
	for (const person of await findStorePeople(tx, { producerId: producer.id, storeId: order.storeId })) {
		await queueMail(tx, {
			producerId: producer.id,
			to: person.email,
			onceKey: confirmationKey(order.id),
			delaySeconds: env.UNDO_SECONDS,
			template: "order-confirmed",
			props: {
				yard,
				sentTo: person.email,
				storeName: order.store.name,
				orderNumber: String(order.number),
				deliveryOn: order.deliveryOn,
				orderUrl: `${env.BASE_URL}/buy/${producer.slug}/${order.store.slug}/orders/${order.number}`,
				lines,
				charges: [{ label: "Delivery", cents: order.deliveryCents }],
				totalCents: goodsCents + order.deliveryCents,
			},
		})
	}
}

/** Names the letters of a confirmation in the outbox, so that undoing it can take them back. */
export function confirmationKey(orderId: string): string {
	return `order-confirmed:${orderId}`
}
