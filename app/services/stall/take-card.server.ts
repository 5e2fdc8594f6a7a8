import { withProducer } from "~/db/transaction.server"
import { findEarlierSale } from "./find-earlier-sale.server"
import { findMarketDay, type StallViewer } from "./find-market-days.server"
import { type PuttingOnReader, putOnReader } from "./put-on-reader.server"
import { type SaleItem, type SaleRefusal, writeSale } from "./write-sale.server"

/**
 * Opens a card sale and puts it on the market's card reader. Sent again, it goes on with the same sale and the same
 * payment. `reader-away` and `reader-busy` leave the sale open: nothing was charged.
 */
export async function takeCard(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
	items: readonly SaleItem[]
}): Promise<PuttingOnReader | SaleRefusal | { ok: false; reason: "no-such-day" } | { ok: false; reason: "no-reader" }> {
	const { producerId, saleId, viewer, items } = query
	const opened = await withProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		if (!day) return { ok: false, reason: "no-such-day" } as const
		if (day.readerId === "") return { ok: false, reason: "no-reader" } as const
		const paid = { method: "card" } as const
		const written = await writeSale(tx, { producerId, saleId, day, personId: viewer.personId, items, paid })
		return written.ok ? ({ ok: true, day } as const) : written
	})
	if (!opened.ok) return opened
	return putOnReader({ producerId, day: opened.day, saleId })
}

/**
 * Puts an open sale on the reader once more, after its card was declined or the reader was away. `after` is the number
 * of the try that failed: pressed twice, it is one more try. A sale that is settled meanwhile is left as it is.
 */
export async function retryCard(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
	after: number
}): Promise<PuttingOnReader | { ok: false; reason: "no-such-sale" }> {
	const { producerId, saleId, after } = query
	const day = await withProducer(producerId, async (tx) => {
		const found = await findMarketDay(tx, query)
		const sale = found ? await findEarlierSale(tx, query) : null
		return found && sale?.dayId === found.id && sale.method === "card" ? found : null
	})
	if (!day) return { ok: false, reason: "no-such-sale" }
	return putOnReader({ producerId, day, saleId, after })
}
