import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { CULLS } from "~/domain/lots/count-harvest"
import { type AssignableLot, type AssignableOrder, assignLots } from "~/domain/promise/assign-lots"

/** Pieces of a released lot in one place. */
export type Shelf = {
	productId: string
	lotId: string
	lotCode: string
	place: "ready" | "cold-room"
	bestBeforeOn: Day
	pieces: number
}

/** So much of a shelf for one order. */
export type ShelfPick = Shelf & { orderId: string }

/** What lies released in the cold room and on the ready shelf, of these products, no culls, and keeps until `on`. */
export async function findShelves(
	tx: Tx,
	query: { producerId: string; productIds: readonly string[]; on: Day },
): Promise<Shelf[]> {
	const { rows } = await tx.execute<Shelf>(sql`
		select l.product_id as "productId", l.id as "lotId", l.code as "lotCode", b.place,
			l.best_before_on::text as "bestBeforeOn", b.pieces
		from lots l
		join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
		where l.producer_id = ${query.producerId} and l.product_id = any(${sql.param(query.productIds)}::uuid[])
			and l.state = 'released' and l.best_before_on >= ${query.on} and l.grade <> ${CULLS}
			and b.place in ('ready', 'cold-room') and b.pieces > 0
		order by l.id, b.place`)
	return rows
}

/**
 * The same shelves, their lots locked in the order of their ids until the transaction ends: nobody moves, releases or
 * withdraws what is about to be packed. Lock the products first.
 */
export async function lockShelves(
	tx: Tx,
	query: { producerId: string; productIds: readonly string[]; on: Day },
): Promise<Shelf[]> {
	await tx.execute(sql`
		select l.id from lots l
		where l.producer_id = ${query.producerId} and l.product_id = any(${sql.param(query.productIds)}::uuid[])
			and l.state = 'released' and l.best_before_on >= ${query.on}
			and exists (
				select from stock_balances b
				where b.producer_id = l.producer_id and b.lot_id = l.id and b.place in ('ready', 'cold-room') and b.pieces > 0
			)
		order by l.id for update`)
	// Read after the locks are held: moves that were waited for are seen.
	return findShelves(tx, query)
}

/**
 * Which shelves of one product serve which order: earliest best-before first, and within a lot the ready shelf before
 * the cold room. `missing` is how many pieces no lot can give.
 */
export function pickShelves(
	shelves: readonly Shelf[],
	orders: readonly AssignableOrder[],
): { picks: ShelfPick[]; missing: number } {
	const lots = new Map<string, AssignableLot>()
	for (const { lotId, bestBeforeOn, pieces } of shelves) {
		const before = lots.get(lotId)?.pieces ?? 0
		lots.set(lotId, { lotId, availableFrom: "0001-01-01", bestBefore: bestBeforeOn, pieces: before + pieces })
	}
	const assigned = assignLots({ lots: [...lots.values()], orders })
	const left = shelves
		.map((shelf) => ({ ...shelf }))
		.toSorted((a, b) => Number(b.place === "ready") - Number(a.place === "ready"))
	const picks = assigned.picks.flatMap(({ orderId, lotId, pieces }) => {
		let needed = pieces
		return left
			.filter((shelf) => shelf.lotId === lotId)
			.flatMap((shelf) => {
				const taken = Math.min(needed, shelf.pieces)
				needed -= taken
				shelf.pieces -= taken
				return taken > 0 ? { ...shelf, pieces: taken, orderId } : []
			})
	})
	const missing = assigned.ok ? 0 : assigned.missing.reduce((sum, { pieces }) => sum + pieces, 0)
	return { picks, missing }
}
