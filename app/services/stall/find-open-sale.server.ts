import { and, eq } from "drizzle-orm"
import { sales } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

/** The sale of a market day that still waits for its card; undefined when it does not, or is not of that day. */
export async function findOpenSale(tx: Tx, query: { producerId: string; dayId: string; saleId: string }) {
	const [sale] = await tx
		.select()
		.from(sales)
		.where(
			and(
				eq(sales.producerId, query.producerId),
				eq(sales.marketDayId, query.dayId),
				eq(sales.id, query.saleId),
				eq(sales.state, "open"),
			),
		)
	return sale
}
