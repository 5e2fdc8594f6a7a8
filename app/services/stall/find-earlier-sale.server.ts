import { and, eq } from "drizzle-orm"
import { saleLines, sales } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

/** A sale that is written already, whatever became of it. */
export type EarlierSale = {
	dayId: string
	method: "card" | "cash"
	state: "open" | "paid" | "given-up"
	totalCents: number
}

/** The sale with this id, or null while it is not written. */
export async function findEarlierSale(
	tx: Tx,
	query: { producerId: string; saleId: string },
): Promise<EarlierSale | null> {
	const [sale] = await tx
		.select({ dayId: sales.marketDayId, method: sales.method, state: sales.state, totalCents: sales.totalCents })
		.from(sales)
		.where(and(eq(sales.producerId, query.producerId), eq(sales.id, query.saleId)))
	return sale ?? null
}

/** What was sold in a sale, in the order of product ids. */
export function findSaleItems(
	tx: Tx,
	query: { producerId: string; saleId: string },
): Promise<{ productId: string; pieces: number }[]> {
	return tx
		.select({ productId: saleLines.productId, pieces: saleLines.pieces })
		.from(saleLines)
		.where(and(eq(saleLines.producerId, query.producerId), eq(saleLines.saleId, query.saleId)))
		.orderBy(saleLines.productId)
}
