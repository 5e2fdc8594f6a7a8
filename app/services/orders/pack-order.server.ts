import { and, eq, sql } from "drizzle-orm"
import { orderLineLots, orders, stockMoves } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { canMove } from "~/domain/orders/order-states"
import { isWeightDoubtful } from "~/domain/pricing/weighed-line"
import { type LockedLine, type LockedOrder, lockOrder } from "./lock-order.server"
import { lockProducts } from "./lock-products.server"
import { lockShelves, pickShelves, type ShelfPick } from "./pick-shelves.server"
import { recordChange } from "./record-change.server"

export type Packing =
	| { ok: true }
	| { ok: false; reason: "no-such-order" }
	| { ok: false; reason: "not-confirmed"; state: string }
	| { ok: false; reason: "lots-too-few"; productName: string; missingPieces: number }
	| { ok: false; reason: "weights"; refused: RefusedWeight[] }

/** The net weight of a line that is priced by weight; `isSure` when it is far from the label and was confirmed. */
export type WeighedLine = { lineId: string; grams: number; isSure: boolean }

/** A line that cannot be packed as it was weighed. */
export type RefusedWeight = {
	lineId: string
	reason: "not-weighed" | "doubtful"
	pieces: number
	pieceNetGrams: number
}

/**
 * Packs a confirmed order: takes what was given of each line from released lots, earliest best-before first, and within
 * a lot from the ready shelf before the cold room; writes which lot fills which line, and the net weight of every line
 * priced by weight, from which its price follows. Refused when the released lots that keep until the delivery do not
 * suffice, when such a line was not weighed, or when its weight is far from the label and nobody said that it is right;
 * nothing is moved then.
 */
export async function packOrder(query: {
	producerId: string
	number: number
	personId: string
	weighed?: readonly WeighedLine[]
}): Promise<Packing> {
	const { producerId, number, personId, weighed = [] } = query
	return withProducer(producerId, async (tx) => {
		const order = await lockOrder(tx, { producerId, number })
		if (!order) return { ok: false, reason: "no-such-order" }
		if (!canMove(order.state, "packed")) return { ok: false, reason: "not-confirmed", state: order.state }
		const refused = order.lines.flatMap((line) => refuseWeight(line, weighed))
		if (refused.length > 0) return { ok: false, reason: "weights", refused }
		const picked = await pickLots(tx, { producerId, order })
		if (!picked.ok) return picked
		if (picked.lines.length > 0) await tx.insert(orderLineLots).values(picked.lines)
		if (picked.shelves.length > 0) await tx.insert(stockMoves).values(movesToOrder(picked.shelves, order, personId))
		const weights = await writeWeights(tx, { order, weighed })
		await tx
			.update(orders)
			.set({ state: "packed" })
			.where(and(eq(orders.producerId, producerId), eq(orders.id, order.id)))
		await recordChange(tx, {
			producerId,
			orderId: order.id,
			kind: "packed",
			userId: personId,
			...(weights.length > 0 ? { detail: { weights } } : {}),
		})
		return { ok: true }
	})
}

const isByWeight = (line: LockedLine) => line.poundCents !== null && (line.givenCases ?? 0) > 0

function refuseWeight(line: LockedLine, weighed: readonly WeighedLine[]): RefusedWeight[] {
	if (!isByWeight(line)) return []
	const pieces = (line.givenCases ?? 0) * line.piecesPerCase
	const { pieceNetGrams } = line.product
	const weight = weighed.find(({ lineId }) => lineId === line.id)
	const refuse = (reason: RefusedWeight["reason"]) => [{ lineId: line.id, reason, pieces, pieceNetGrams }]
	if (!weight || weight.grams <= 0) return refuse("not-weighed")
	return !weight.isSure && isWeightDoubtful(weight.grams, { pieces, pieceNetGrams }) ? refuse("doubtful") : []
}

/** Writes the net weights of the lines that are priced by weight; answers them for the record, by code. */
async function writeWeights(
	tx: Tx,
	{ order, weighed }: { order: LockedOrder; weighed: readonly WeighedLine[] },
): Promise<{ code: string; grams: number }[]> {
	const grams = new Map(weighed.map((line) => [line.lineId, line.grams]))
	const lines = order.lines.filter(isByWeight)
	if (lines.length === 0) return []
	const values = lines.map((line) => ({ id: line.id, grams: grams.get(line.id) ?? null }))
	await tx.execute(sql`
		update order_lines l set weighed_grams = w.grams
		from jsonb_to_recordset(${JSON.stringify(values)}::jsonb) as w(id uuid, grams integer)
		where l.producer_id = ${order.producerId} and l.id = w.id`)
	return lines.map((line) => ({ code: line.product.code, grams: grams.get(line.id) ?? 0 }))
}

type Picked =
	| { ok: true; lines: (typeof orderLineLots.$inferInsert)[]; shelves: ShelfPick[] }
	| { ok: false; reason: "lots-too-few"; productName: string; missingPieces: number }

async function pickLots(tx: Tx, query: { producerId: string; order: LockedOrder }): Promise<Picked> {
	const { producerId, order } = query
	const productIds = order.lines.map((line) => line.productId)
	await lockProducts(tx, { producerId, productIds })
	const shelves = await lockShelves(tx, { producerId, productIds, on: order.deliveryOn })
	const lines: (typeof orderLineLots.$inferInsert)[] = []
	const taken: ShelfPick[] = []
	for (const line of order.lines) {
		const pieces = (line.givenCases ?? 0) * line.piecesPerCase
		const { picks, missing } = pickShelves(
			shelves.filter((shelf) => shelf.productId === line.productId),
			[{ orderId: order.id, on: order.deliveryOn, pieces }],
		)
		if (missing > 0)
			return { ok: false, reason: "lots-too-few", productName: line.product.name, missingPieces: missing }
		const byLot = new Map<string, number>()
		for (const pick of picks) byLot.set(pick.lotId, (byLot.get(pick.lotId) ?? 0) + pick.pieces)
		for (const [lotId, pieces] of byLot) lines.push({ producerId, orderLineId: line.id, lotId, pieces })
		taken.push(...picks)
	}
	return { ok: true, lines, shelves: taken }
}

/** The moves that bring what was taken to the order; what lies in the cold room goes by way of the ready shelf. */
function movesToOrder(
	taken: readonly ShelfPick[],
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
