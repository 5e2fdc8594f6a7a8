import { and, eq } from "drizzle-orm"
import { saleLineLots, sales, stockMoves } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findCardOutcome } from "~/platform/card-outcome.server"
import { stopAskingForCard } from "~/platform/card-reader.server"
import { log } from "~/platform/log.server"
import { findMarketDay, type StallViewer } from "./find-market-days.server"
import { settleSale } from "./settle-sale.server"

export type GivingUp = { ok: true } | { ok: false; reason: "no-such-sale" | "already-paid" | "no-answer" }

/**
 * Gives up an open card sale: the reader is cleared, the payment closed, and the pieces stand on the table again. A sale
 * whose card went through in the same moment is paid instead. Without an answer from the payment service nothing is given
 * up, as the card may be in the reader.
 */
export async function giveUpSale(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
}): Promise<GivingUp> {
	const { producerId, dayId, viewer, saleId } = query
	const isSale = and(eq(sales.producerId, producerId), eq(sales.id, saleId), eq(sales.marketDayId, dayId))
	const found = await withProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, { producerId, dayId, viewer })
		const [sale] = day ? await tx.select().from(sales).where(isSale) : []
		return day && sale ? { day, sale } : null
	})
	if (!found || found.sale.state === "given-up") return { ok: false, reason: "no-such-sale" }
	if (found.sale.state === "paid") return { ok: false, reason: "already-paid" }
	const intentId = found.sale.stripePaymentIntentId
	try {
		if (intentId) await stopAskingForCard({ readerId: found.day.readerId, intentId })
	} catch (error) {
		log.warn({ err: error, saleId }, "the sale could not be taken off the reader")
		const outcome = intentId ? await findCardOutcome({ intentId }).catch(() => null) : null
		if (outcome?.state !== "paid") return { ok: false, reason: "no-answer" }
		await withProducer(producerId, (tx) => settleSale(tx, { producerId, saleId, outcome }))
		return { ok: false, reason: "already-paid" }
	}
	return withProducer(producerId, async (tx) => {
		const [given] = await tx
			.update(sales)
			.set({ state: "given-up" })
			.where(and(isSale, eq(sales.state, "open")))
			.returning({ id: sales.id })
		if (!given) return { ok: false, reason: "already-paid" }
		const pieces = await tx
			.select()
			.from(saleLineLots)
			.where(and(eq(saleLineLots.producerId, producerId), eq(saleLineLots.saleId, saleId)))
			.orderBy(saleLineLots.lotId)
		await tx.insert(stockMoves).values(
			pieces.map((line) => ({
				producerId,
				lotId: line.lotId,
				fromPlace: "sold" as const,
				fromRef: dayId,
				toPlace: "market" as const,
				toRef: dayId,
				pieces: line.pieces,
				reason: "card sale given up",
				movedBy: viewer.personId,
			})),
		)
		return { ok: true }
	})
}
