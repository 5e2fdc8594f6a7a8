import { and, asc, eq, sql } from "drizzle-orm"
import { saleLines, sales } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import { type DayTotals, dayTotals } from "~/domain/stall/sale-totals"
import { type DayPieces, findDayPieces } from "./find-day-pieces.server"
import { findMarketDay, type MarketDay, type StallViewer } from "./find-market-days.server"

export type TotalsPage = {
	day: MarketDay
	pieces: DayPieces[]
	totals: DayTotals
	openSales: { id: string; totalCents: number; pieces: number }[]
}

/** What a day took and where its pieces are; null when the viewer is not named on it. */
export function findDayTotals(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
}): Promise<TotalsPage | null> {
	return readProducer(query.producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		if (!day) return null
		const rows = await listSales(tx, query)
		return {
			day,
			pieces: await findDayPieces(tx, query),
			totals: dayTotals({
				sales: rows.filter(({ state }) => state === "paid"),
				floatCents: day.floatCents,
				paidOutCents: 0,
			}),
			openSales: rows
				.filter(({ state }) => state === "open")
				.map(({ id, totalCents, pieces }) => ({ id, totalCents, pieces })),
		}
	})
}

function listSales(tx: Tx, { producerId, dayId }: { producerId: string; dayId: string }) {
	return tx
		.select({
			id: sales.id,
			state: sales.state,
			method: sales.method,
			totalCents: sales.totalCents,
			pieces: sql`sum(${saleLines.pieces})`.mapWith(Number),
		})
		.from(sales)
		.innerJoin(saleLines, and(eq(saleLines.producerId, sales.producerId), eq(saleLines.saleId, sales.id)))
		.where(and(eq(sales.producerId, producerId), eq(sales.marketDayId, dayId)))
		.groupBy(sales.producerId, sales.id)
		.orderBy(asc(sales.soldAt), asc(sales.id))
}
