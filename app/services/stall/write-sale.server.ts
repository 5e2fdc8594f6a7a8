import { sql } from "drizzle-orm"
import { saleLineLots, saleLines, sales, stockMoves } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { assignLots } from "~/domain/promise/assign-lots"
import { saleTotals } from "~/domain/stall/sale-totals"
import { lockProducts } from "~/services/orders/lock-products.server"
import { type EarlierSale, findEarlierSale, findSaleItems } from "./find-earlier-sale.server"
import type { MarketDay } from "./find-market-days.server"
import { findTable } from "./find-table.server"

/** Pieces of one product in a sale. */
export type SaleItem = { productId: string; pieces: number }

export type NewSale = {
	producerId: string
	/** Made on the phone: a second send finds the first. */
	saleId: string
	day: MarketDay
	personId: string
	items: readonly SaleItem[]
	paid: { method: "cash"; givenCents: number } | { method: "card" }
}

export type SaleRefusal =
	| { ok: false; reason: "nothing-sold" }
	| { ok: false; reason: "day-not-open" }
	| { ok: false; reason: "written-before"; earlier: EarlierSale }
	| { ok: false; reason: "not-so-many"; productName: string; left: number }
	| { ok: false; reason: "too-little-given"; totalCents: number }

/**
 * Writes a sale and takes its pieces from the table, earliest best-before first: a cash sale is paid at once, a card sale
 * is open until the card is. Its pieces are gone from the table either way, so that nobody else sells them meanwhile.
 * Sent again, the same sale is answered as before and nothing more is sold. Another sale under its id is refused
 * (`written-before`), as is one that was given up.
 */
export async function writeSale(tx: Tx, sale: NewSale): Promise<{ ok: true; totalCents: number } | SaleRefusal> {
	const { producerId, saleId, day, personId, items, paid } = sale
	if (items.length === 0) return { ok: false, reason: "nothing-sold" }
	await lockProducts(tx, { producerId, productIds: items.map(({ productId }) => productId) })
	const earlier = await findEarlierSale(tx, { producerId, saleId })
	if (earlier) {
		const isSame = earlier.state !== "given-up" && earlier.dayId === day.id && earlier.method === paid.method
		if (isSame && isSameItems(items, await findSaleItems(tx, { producerId, saleId })))
			return { ok: true, totalCents: earlier.totalCents }
		return { ok: false, reason: "written-before", earlier }
	}

	if (day.state !== "open") return { ok: false, reason: "day-not-open" }
	const table = new Map((await findTable(tx, { producerId, dayId: day.id })).map((item) => [item.productId, item]))
	for (const { productId, pieces } of items) {
		const item = table.get(productId)
		if (!item) return { ok: false, reason: "not-so-many", productName: "that", left: 0 }
		if (pieces > item.left) return { ok: false, reason: "not-so-many", productName: item.name, left: item.left }
	}
	const lines = items.map(({ productId, pieces }) => ({
		productId,
		pieces,
		pieceCents: table.get(productId)?.pieceCents ?? 0,
	}))
	const { totalCents } = saleTotals(lines)
	if (paid.method === "cash" && paid.givenCents < totalCents)
		return { ok: false, reason: "too-little-given", totalCents }

	await tx.insert(sales).values({
		producerId,
		id: saleId,
		marketDayId: day.id,
		method: paid.method,
		state: paid.method === "cash" ? "paid" : "open",
		totalCents,
		givenCents: paid.method === "cash" ? paid.givenCents : null,
		paidAt: paid.method === "cash" ? sql`now()` : null,
		soldBy: personId,
	})
	await tx.insert(saleLines).values(lines.map((line) => ({ producerId, saleId, ...line })))
	const picks = await pickFromTable(tx, { producerId, day, items })
	await tx.insert(saleLineLots).values(picks.map((pick) => ({ producerId, saleId, ...pick })))
	await tx.insert(stockMoves).values(
		picks
			.toSorted((a, b) => (a.lotId < b.lotId ? -1 : 1))
			.map(({ lotId, pieces }) => ({
				producerId,
				lotId,
				fromPlace: "market" as const,
				fromRef: day.id,
				toPlace: "sold" as const,
				toRef: day.id,
				pieces,
				reason: "sold at the stall",
				movedBy: personId,
			})),
	)
	return { ok: true, totalCents }
}

function isSameItems(items: readonly SaleItem[], written: readonly SaleItem[]): boolean {
	const pieces = new Map(written.map((item) => [item.productId, item.pieces]))
	return items.length === written.length && items.every((item) => pieces.get(item.productId) === item.pieces)
}

async function pickFromTable(
	tx: Tx,
	query: { producerId: string; day: MarketDay; items: readonly SaleItem[] },
): Promise<{ productId: string; lotId: string; pieces: number }[]> {
	const { producerId, day, items } = query
	const { rows } = await tx.execute<{ product_id: string; lot_id: string; best_before_on: string; pieces: number }>(sql`
		select l.product_id, b.lot_id, l.best_before_on::text, b.pieces
		from stock_balances b
		join lots l on l.producer_id = b.producer_id and l.id = b.lot_id
		where b.producer_id = ${producerId} and b.place = 'market' and b.place_ref = ${day.id} and b.pieces > 0
			and l.state <> 'withdrawn'`)
	return items.flatMap(({ productId, pieces }) => {
		const lots = rows
			.filter((row) => row.product_id === productId)
			.map((row) => ({
				lotId: row.lot_id,
				availableFrom: day.on,
				bestBefore: row.best_before_on,
				pieces: row.pieces,
			}))
		const assigned = assignLots({ lots, orders: [{ orderId: productId, on: day.on, pieces }] })
		if (!assigned.ok) throw new Error("the table was counted under the same lock")
		return assigned.picks.map((pick) => ({ productId, lotId: pick.lotId, pieces: pick.pieces }))
	})
}
