import { and, eq, sql } from "drizzle-orm"
import { sales } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import { type EarlierSale, findEarlierSale } from "./find-earlier-sale.server"
import { findMarketDay, type MarketDay, type StallViewer } from "./find-market-days.server"
import { findTable, type TableItem } from "./find-table.server"

type StallQuery = { producerId: string; dayId: string; viewer: StallViewer }

/**
 * What a volunteer sells from; null when they are not named on the day. With `saleId` also the sale that is written under
 * that id already, as after going back to one that is over.
 */
export function findStallPage(
	query: StallQuery & { saleId: string | null },
): Promise<{ day: MarketDay; table: TableItem[]; earlier: EarlierSale | null } | null> {
	const { producerId, saleId } = query
	return readProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		if (!day) return null
		const earlier = saleId === null ? null : await findEarlierSale(tx, { producerId, saleId })
		return { day, table: await findTable(tx, query), earlier }
	})
}

export type SalePage = {
	day: MarketDay
	sale: {
		state: "open" | "paid" | "given-up"
		totalCents: number
		declineMessage: string
		/** The number of the try that is on, or failed. */
		attempt: number
		hasPayment: boolean
	}
}

/** One card sale of a day as its page shows it. */
export function findSalePage(query: StallQuery & { saleId: string }): Promise<SalePage | null> {
	const { producerId, dayId, saleId } = query
	return readProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		if (!day) return null
		const [sale] = await tx
			.select({
				state: sales.state,
				totalCents: sales.totalCents,
				declineMessage: sales.declineMessage,
				attempt: sales.attempt,
				hasPayment: sql<boolean>`${sales.stripePaymentIntentId} is not null`,
			})
			.from(sales)
			.where(
				and(
					eq(sales.producerId, producerId),
					eq(sales.marketDayId, dayId),
					eq(sales.id, saleId),
					eq(sales.method, "card"),
				),
			)
		return sale ? { day, sale } : null
	})
}
