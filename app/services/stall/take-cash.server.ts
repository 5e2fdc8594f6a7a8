import { withProducer } from "~/db/transaction.server"
import { findMarketDay, type StallViewer } from "./find-market-days.server"
import { type SaleItem, type SaleRefusal, writeSale } from "./write-sale.server"

/** Writes a sale paid in cash, once for each sale id. `no-such-day` when the viewer is not named on the day. */
export function takeCash(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
	items: readonly SaleItem[]
	givenCents: number
}): Promise<{ ok: true; totalCents: number } | SaleRefusal | { ok: false; reason: "no-such-day" }> {
	const { producerId, viewer, saleId, items, givenCents } = query
	return withProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		if (!day) return { ok: false, reason: "no-such-day" }
		const paid = { method: "cash", givenCents } as const
		return writeSale(tx, { producerId, saleId, day, personId: viewer.personId, items, paid })
	})
}
