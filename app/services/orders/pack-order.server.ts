import { and, eq, sql } from "drizzle-orm"
import { orderLineLots, orders, stockMoves } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { canMove } from "~/domain/orders/order-states"
import { assignLots } from "~/domain/promise/assign-lots"
import { type LockedOrder, lockOrder } from "./lock-order.server"
import { lockProducts } from "./lock-products.server"
import { recordChange } from "./record-change.server"

export type Packing =
	| { ok: true }
	| { ok: false; reason: "no-such-order" }
	| { ok: false; reason: "not-confirmed"; state: string }
	| { ok: false; reason: "lots-too-few"; productName: string; missingPieces: number }

type Shelf = { lotId: string; place: "ready" | "cold-room"; bestBeforeOn: string; pieces: number }

/**
 * Packs a confirmed order: takes what was given of each line from released lots, earliest best-before first, and within
 * a lot from the ready shelf before the cold room; writes which lot fills which line. Refused when the released lots
 * that keep until the delivery do not suffice; nothing is moved then.
 */
export async function packOrder(query: { producerId: string; number: number; personId: string }): Promise<Packing> {
	const { producerId, number, personId } = query
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (!canMove(order.state, "packed")) return { ok: false, reason: "not-confirmed", state: order.state }
		const picked = await pickLots(tx, { producerId, order })
		if (!picked.ok) return picked
		if (picked.lines.length > 0) await tx.insert(orderLineLots).values(picked.lines)
		if (picked.shelves.length > 0) await tx.insert(stockMoves).values(movesToOrder(picked.shelves, order, personId))
		await tx
			.update(orders)
			.set({ state: "packed" })
			.where(and(eq(orders.producerId, producerId), eq(orders.id, order.id)))
		await recordChange(tx, { producerId, orderId: order.id, kind: "packed", userId: personId })
		return { ok: true }
	})
}

type Picked =
	| { ok: true; lines: (typeof orderLineLots.$inferInsert)[]; shelves: Shelf[] }
	| { ok: false; reason: "lots-too-few"; productName: string; missingPieces: number }

async function pickLots(tx: Tx, query: { producerId: string; order: LockedOrder }): Promise<Picked> {
	const { producerId, order } = query
	const productIds = order.lines.map((line) => line.productId)
	await lockProducts(tx, { producerId, productIds })
	const { rows } = await tx.execute<Shelf & { productId: string }>(sql`
		select l.product_id as "productId", l.id as "lotId", b.place, l.best_before_on::text as "bestBeforeOn", b.pieces
		from lots l
		join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
		where l.producer_id = ${producerId} and l.product_id = any(${sql.param(productIds)}::uuid[])
			and l.state = 'released' and l.best_before_on >= ${order.deliveryOn}
			and b.place in ('ready', 'cold-room') and b.pieces > 0`)
	const lines: (typeof orderLineLots.$inferInsert)[] = []
	const taken: Shelf[] = []
	for (const line of order.lines) {
		const needed = (line.givenCases ?? 0) * line.piecesPerCase
		const shelves = rows.filter((shelf) => shelf.productId === line.productId)
		const lots = [...new Map(shelves.map((shelf) => [shelf.lotId, shelf])).values()].map((shelf) => ({
			lotId: shelf.lotId,
			availableFrom: order.deliveryOn,
			bestBefore: shelf.bestBeforeOn,
			pieces: shelves.filter(({ lotId }) => lotId === shelf.lotId).reduce((sum, { pieces }) => sum + pieces, 0),
		}))
		const assigned = assignLots({ lots, orders: [{ orderId: order.id, on: order.deliveryOn, pieces: needed }] })
		if (!assigned.ok) {
			const missingPieces = assigned.missing.reduce((sum, { pieces }) => sum + pieces, 0)
			return { ok: false, reason: "lots-too-few", productName: line.product.name, missingPieces }
		}
		for (const pick of assigned.picks) {
			lines.push({ producerId, orderLineId: line.id, lotId: pick.lotId, pieces: pick.pieces })
			taken.push(...takeFromShelves(shelves, pick))
		}
	}
	return { ok: true, lines, shelves: taken }
}

/** The moves that bring what was taken to the order; what lies in the cold room goes by way of the ready shelf. */
function movesToOrder(
	taken: readonly Shelf[],
	order: LockedOrder,
	movedBy: string,
): (typeof stockMoves.$inferInsert)[] {
	// Balances are locked by the moves themselves: always in the same order.
	return taken
		.toSorted((a, b) => (a.lotId + a.place < b.lotId + b.place ? -1 : 1))
		.flatMap(({ lotId, place, pieces }) => {
			const move = { producerId: order.producerId, lotId, pieces, movedBy }
			const packed = {
				...move,
				fromPlace: "ready" as const,
				toPlace: "packed" as const,
				toRef: order.id,
				reason: `packed for order ${order.number}`,
			}
			const fetched = {
				...move,
				fromPlace: "cold-room" as const,
				toPlace: "ready" as const,
				reason: "taken out to pack",
			}
			return place === "cold-room" ? [fetched, packed] : [packed]
		})
}

/** Which shelf gives how much of a pick: the ready shelf first. */
function takeFromShelves(shelves: readonly Shelf[], pick: { lotId: string; pieces: number }): Shelf[] {
	let left = pick.pieces
	return shelves
		.filter(({ lotId }) => lotId === pick.lotId)
		.sort((a) => (a.place === "ready" ? -1 : 1))
		.flatMap((shelf) => {
			const pieces = Math.min(left, shelf.pieces)
			left -= pieces
			return pieces > 0 ? { ...shelf, pieces } : []
		})
}
