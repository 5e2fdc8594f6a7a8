import { and, asc, eq, sql } from "drizzle-orm"
import { saleLines, sales } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import { type DayTotals, dayTotals } from "~/domain/stall/sale-totals"
import { findMarketDay, type MarketDay, type StallViewer } from "./find-market-days.server"
import { findTable, type TableItem } from "./find-table.server"

type StallQuery = { producerId: string; dayId: string; viewer: StallViewer }

/** What a volunteer sells from; null when they are not named on the day. */
export function findStallPage(query: StallQuery): Promise<{ day: MarketDay; table: TableItem[] } | null> {
	return readProducer(query.producerId, (tx) => readStall(tx, query))
}

async function readStall(tx: Tx, query: StallQuery): Promise<{ day: MarketDay; table: TableItem[] } | null> {
	const day = await findMarketDay(tx, query)
	return day ? { day, table: await findTable(tx, query) } : null
}

export type SalePage = {
	day: MarketDay
	sale: {
		id: string
		state: "open" | "paid" | "given-up"
		totalCents: number
		declineMessage: string
		isAtReader: boolean
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
				id: sales.id,
				state: sales.state,
				totalCents: sales.totalCents,
				declineMessage: sales.declineMessage,
				isAtReader: sql<boolean>`${sales.stripePaymentIntentId} is not null`,
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

export type TotalsPage = {
	day: MarketDay
	table: TableItem[]
	totals: DayTotals
	openSales: { id: string; totalCents: number }[]
}

/** What a day took and where its pieces are: sold and still on the table make what was brought. */
export function findDayTotals(query: StallQuery): Promise<TotalsPage | null> {
	const { producerId, dayId } = query
	return readProducer(producerId, async (tx) => {
		const stall = await readStall(tx, query)
		if (!stall) return null
		const rows = await tx
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
			.orderBy(asc(sales.soldAt))
		return {
			...stall,
			totals: dayTotals({
				sales: rows.filter(({ state }) => state === "paid"),
				floatCents: stall.day.floatCents,
				paidOutCents: 0,
			}),
			openSales: rows.filter(({ state }) => state === "open").map(({ id, totalCents }) => ({ id, totalCents })),
		}
	})
}
