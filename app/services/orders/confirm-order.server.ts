import { and, eq, sql } from "drizzle-orm"
import { orders } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { canMove } from "~/domain/orders/order-states"
import { shortSentence } from "~/domain/orders/short-sentence"
import { priceOrder } from "~/domain/pricing/price-order"
import { now } from "~/platform/clock.server"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import { findSharedSentences } from "~/services/sharing/find-shared-sentences.server"
import { findMostCases } from "./find-most-cases.server"
import { type LockedLine, type LockedOrder, lockOrder } from "./lock-order.server"
import { lockProducts } from "./lock-products.server"
import { findStorePeople } from "./order-people.server"
import { recordChange } from "./record-change.server"

/** What the producer gives of one line, and why it is less than asked (empty: the plain sentence). */
export type GivenLine = { lineId: string; cases: number; reason: string }

export type Confirmation =
	| { ok: true }
	| { ok: false; reason: "no-such-order" | "nothing-given" }
	| { ok: false; reason: "not-placed"; state: string }
	| { ok: false; reason: "lines"; refused: RefusedLine[] }

/** A line that was given too much, and the most that it can get. */
export type RefusedLine = { lineId: string; reason: "more-than-asked" | "more-than-free"; mostCases: number }

/**
 * Confirms an order with what can be given of each line; lines not named get what sharing out has given them, or all that was asked. Refused, with each
 * line that is given more than was asked, or than is free for the day besides all other promises. Tells the store's people once, after the time in which the decision can be undone.
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
			return { ...line, cases: given?.cases ?? line.givenCases ?? line.askedCases, reason: given?.reason ?? "" }
		})
		if (lines.every((line) => line.cases === 0)) return { ok: false, reason: "nothing-given" }
		const refused = await refuseLines(tx, { producer, order, lines })
		if (refused.length > 0) return { ok: false, reason: "lines", refused }

		await tx.execute(sql`
			update order_lines set given_cases = given.cases
			from unnest(${sql.param(lines.map(({ id }) => id))}::uuid[], ${sql.param(lines.map(({ cases }) => cases))}::int[]) as given(id, cases)
			where order_lines.producer_id = ${producer.id} and order_lines.id = given.id`)
		await tx
			.update(orders)
			.set({ state: "confirmed" })
			.where(and(eq(orders.producerId, producer.id), eq(orders.id, order.id)))
		const shared = await findSharedSentences(tx, { producerId: producer.id, orderIds: [order.id] })
		const keepsPrice = await findKeptPrices(tx, { producer, order, lines })
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
							reason: line.reason || (shared.get(line.id)?.given === line.cases ? shared.get(line.id)?.how : undefined),
							keepsPrice: keepsPrice.has(line.productId),
						})
					: null,
		}))
		// One sentence to a line: the invoice sets each beside its product.
		const shortNote = told.flatMap(({ reason }) => reason ?? []).join("\n")
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

type GivenOrder = {
	producer: { id: string; timeZone: string }
	order: LockedOrder
	lines: readonly (LockedLine & { cases: number })[]
}

/** The lines that are given too much, with the products locked from here on. */
async function refuseLines(tx: Tx, { producer, order, lines }: GivenOrder): Promise<RefusedLine[]> {
	const productIds = order.lines.map((line) => line.productId)
	await lockProducts(tx, { producerId: producer.id, productIds })
	const today = dayInZone(now(), producer.timeZone)
	const most = await findMostCases(tx, {
		producerId: producer.id,
		deliveryOn: order.deliveryOn,
		today,
		lines: order.lines,
	})
	return lines.flatMap((line) => {
		const mostCases = most.get(line.id) ?? 0
		if (line.cases <= mostCases) return []
		const isBeyondAsked = line.cases > line.askedCases
		return [{ lineId: line.id, reason: isBeyondAsked ? "more-than-asked" : "more-than-free", mostCases }]
	})
}

/** The products cut short whose price is that of a break which the given cases alone would not reach. */
async function findKeptPrices(tx: Tx, { producer, order, lines }: GivenOrder): Promise<Set<string>> {
	const short = lines.filter((line) => line.cases < line.askedCases)
	if (short.length === 0) return new Set()
	const today = dayInZone(now(), producer.timeZone)
	const products = await findStorePrices(tx, { producerId: producer.id, storeId: order.storeId, today })
	const given = new Map(lines.map((line) => [line.productId, line.cases]))
	const priced = priceOrder({
		lines: products.map((product) => ({ ...product, cases: given.get(product.productId) ?? 0 })),
		terms: order.store,
	})
	const caseCents = new Map(priced.lines.map((line) => [line.productId, line.caseCents]))
	return new Set(
		short.filter((line) => (caseCents.get(line.productId) ?? 0) > line.caseCents).map((line) => line.productId),
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
	for (const person of await findStorePeople(tx, {
		producerId: producer.id,
		storeId: order.storeId,
		kind: "confirmations",
	})) {
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
