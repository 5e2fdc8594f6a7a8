import { and, eq, sql } from "drizzle-orm"
import { sales } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { askForCard } from "~/platform/card-reader.server"
import { log } from "~/platform/log.server"
import { findMarketDay, type MarketDay, type StallViewer } from "./find-market-days.server"
import { type SaleItem, type SaleRefusal, writeSale } from "./write-sale.server"

export type CardSale =
	| { ok: true }
	| SaleRefusal
	| { ok: false; reason: "no-such-day" | "no-such-sale" | "no-reader" | "reader-away" }

type SaleAtReader = { id: string; attempt: number; intentId: string | null; totalCents: number }

/**
 * Opens a card sale and puts it on the market's card reader. Sending it again, or after the reader was away, goes on with
 * the same sale and the same payment. `reader-away` leaves the sale open: nothing was charged.
 */
export async function takeCard(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
	items: readonly SaleItem[]
}): Promise<CardSale> {
	const { producerId, dayId, viewer, saleId, items } = query
	const opened = await withProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, { producerId, dayId, viewer })
		if (!day) return { ok: false, reason: "no-such-day" } as const
		if (day.readerId === "") return { ok: false, reason: "no-reader" } as const
		const paid = { method: "card" } as const
		const written = await writeSale(tx, { producerId, saleId, day, personId: viewer.personId, items, paid })
		return written.ok ? ({ ok: true, day } as const) : written
	})
	if (!opened.ok) return opened
	return putOnReader({ producerId, day: opened.day, saleId })
}

/** Puts an open sale on the reader once more, after its card was declined or the reader was away. */
export async function retryCard(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
}): Promise<CardSale> {
	const { producerId, dayId, viewer, saleId } = query
	const day = await withProducer(producerId, (tx) => findMarketDay(tx, { producerId, dayId, viewer }))
	if (!day) return { ok: false, reason: "no-such-day" }
	return putOnReader({ producerId, day, saleId })
}

async function putOnReader(query: { producerId: string; day: MarketDay; saleId: string }): Promise<CardSale> {
	const { producerId, day, saleId } = query
	const isSale = and(
		eq(sales.producerId, producerId),
		eq(sales.id, saleId),
		eq(sales.marketDayId, day.id),
		eq(sales.state, "open"),
	)
	const sale = await withProducer(producerId, async (tx): Promise<SaleAtReader | undefined> => {
		const [row] = await tx
			.update(sales)
			.set({
				declineMessage: "",
				attempt: sql`${sales.attempt} + case when ${sales.declineMessage} = '' then 0 else 1 end`,
			})
			.where(isSale)
			.returning({
				id: sales.id,
				attempt: sales.attempt,
				intentId: sales.stripePaymentIntentId,
				totalCents: sales.totalCents,
			})
		return row
	})
	if (!sale) return { ok: false, reason: "no-such-sale" }
	try {
		const intentId = await askForCard({
			readerId: day.readerId,
			key: sale.id,
			attempt: sale.attempt,
			intentId: sale.intentId,
			amountCents: sale.totalCents,
			metadata: { producer_id: producerId, sale_id: sale.id },
		})
		await withProducer(producerId, (tx) => tx.update(sales).set({ stripePaymentIntentId: intentId }).where(isSale))
		return { ok: true }
	} catch (error) {
		log.warn({ err: error, saleId }, "the card reader did not take the sale")
		return { ok: false, reason: "reader-away" }
	}
}
