import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { afterEach, beforeEach, vi } from "vitest"
import { lots, outboxMails, stockMoves, users } from "~/db/schema"
import { withPlatform, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { findDeskOrder } from "~/services/orders/find-desk-order.server"
import { packOrder } from "~/services/orders/pack-order.server"
import { placeOrder } from "~/services/orders/place-order.server"
import { type Shop, THURSDAY, TUESDAY_18, type Yard, ZONE } from "../orders/place-yard"

/** The producer as services take it. */
export const producerOf = (yard: Yard) => ({
	id: yard.producerId,
	slug: yard.slug,
	name: "Larkmoor Bee Yard",
	timeZone: ZONE,
})

/** The desk's clock stands at Thursday, August 13, before last orders for Tuesday. Timers run as ever. */
export function standOnThursday(): void {
	beforeEach(() => {
		vi.useFakeTimers({ toFake: ["Date"], now: THURSDAY })
	})
	afterEach(() => {
		vi.useRealTimers()
	})
}

/** Someone who works at the desk. */
export async function addHand(): Promise<string> {
	const id = randomUUID()
	await withPlatform((tx) => tx.insert(users).values({ id, name: "Ida", email: `${id}@larkmoor.example.test` }))
	return id
}

/** Places an order for Tuesday and answers its number. Lines are [product, cases], kept where more than free is asked. */
export async function place(shop: Shop, ...lines: [productId: string, cases: number][]): Promise<number> {
	const answer = await placeOrder({
		producerId: shop.producerId,
		storeId: shop.storeId,
		person: shop.person,
		zone: ZONE,
		now: THURSDAY,
		deliveryOn: TUESDAY_18,
		lines: lines.map(([productId, cases]) => ({ productId, cases, keep: true })),
		poNumber: "",
		note: "",
		idempotencyKey: randomUUID(),
	})
	if (!answer.ok) throw new Error(`the order was not placed: ${answer.reason}`)
	return answer.number
}

/** The order as the desk sees it. Throws when there is none. */
export async function orderAt(yard: Yard, number: number) {
	const order = await findDeskOrder({ producerId: yard.producerId, number, now: THURSDAY, zone: ZONE })
	if (!order) throw new Error(`no order ${number}`)
	return order
}

/** Places, confirms in full and packs an order; answers its number. */
export async function packed(
	yard: Yard,
	shop: Shop,
	personId: string,
	...lines: [productId: string, cases: number][]
): Promise<number> {
	const number = await place(shop, ...lines)
	const steps = [
		await confirmOrder({ producer: producerOf(yard), number, personId, given: [] }),
		await packOrder({ producerId: yard.producerId, number, personId }),
	]
	for (const step of steps) if (!step.ok) throw new Error(step.reason)
	return number
}

/** A released lot of a product with pieces on a shelf. */
export async function addLot(
	yard: Yard,
	lot: { productId: string; code: string; bestBeforeOn: Day; ready?: number; coldRoom?: number; state?: "held" },
): Promise<string> {
	const { producerId } = yard
	const { ready = 0, coldRoom = 0, state = "released", ...facts } = lot
	const lotId = randomUUID()
	await withProducer(producerId, async (tx) => {
		await tx.insert(lots).values({
			producerId,
			id: lotId,
			...facts,
			state,
			harvestedOn: "2026-07-01",
			expectedReleaseOn: "2026-07-10",
			piecesHarvested: ready + coldRoom,
		})
		const move = { producerId, lotId, toPlace: "cold-room" as const, pieces: ready + coldRoom, reason: "harvest" }
		await tx.insert(stockMoves).values(move)
		if (ready > 0)
			await tx
				.insert(stockMoves)
				.values({ ...move, fromPlace: "cold-room", toPlace: "ready", pieces: ready, reason: "released" })
	})
	return lotId
}

/** Marks all waiting letters of a producer as gone. */
export async function sendLetters(yard: Yard): Promise<void> {
	await withProducer(yard.producerId, (tx) => tx.update(outboxMails).set({ sentAt: sql`now()` }))
}

/** Where the pieces of a lot are: "ready 12, packed 24". */
export async function whereIs(yard: Yard, lotId: string): Promise<string> {
	const { rows } = await withProducer(yard.producerId, (tx) =>
		tx.execute<{ place: string; pieces: number }>(sql`
			select place, sum(pieces)::int as pieces from stock_balances
			where producer_id = ${yard.producerId} and lot_id = ${lotId} and pieces > 0 group by place order by place`),
	)
	return rows.map(({ place, pieces }) => `${place} ${pieces}`).join(", ")
}
