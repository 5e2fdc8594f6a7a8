import { and, asc, eq } from "drizzle-orm"
import { saleLineLots, sales, stockMoves } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { type CardOutcome, findCardOutcome } from "~/platform/card-outcome.server"
import { stopAskingForCard } from "~/platform/card-reader.server"
import { log } from "~/platform/log.server"
import { lockProducts } from "~/services/orders/lock-products.server"
import { findSaleItems } from "./find-earlier-sale.server"
import { findMarketDay, type StallViewer } from "./find-market-days.server"
import { settleSale } from "./settle-sale.server"
import type { SaleItem } from "./write-sale.server"

type GiveUp = { producerId: string; dayId: string; viewer: StallViewer; saleId: string }

export type GivingUp =
	| { ok: true; items: SaleItem[] }
	| { ok: false; reason: "no-such-sale" | "already-paid" | "no-answer" }

/**
 * Gives up an open card sale: its payment is closed, the reader cleared, and the pieces stand on the table again; the
 * answer names them. A sale whose card went through in the same moment is paid instead. While the payment cannot be
 * closed nothing is given up, as the card may be in the reader. Given up twice, it is given up once.
 */
export async function giveUpSale(query: GiveUp): Promise<GivingUp> {
	const { producerId, saleId } = query
	const found = await withProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		const [sale] = day ? await tx.select().from(sales).where(isSale(query)) : []
		return day && sale ? { day, sale } : null
	})
	if (found?.sale.method !== "card") return { ok: false, reason: "no-such-sale" }
	const { state, stripePaymentIntentId: intentId } = found.sale
	if (state === "open" && intentId) {
		const outcome = await closePaymentOf({ readerId: found.day.readerId, intentId, saleId })
		if (!outcome) return { ok: false, reason: "no-answer" }
		await withProducer(producerId, (tx) => settleSale(tx, { producerId, saleId, outcome }))
	}
	return withProducer(producerId, (tx) => putBackOnTable(tx, query, intentId))
}

/** What became of the payment once it takes no card any more; null when that is not known, or not so. */
async function closePaymentOf(sale: {
	readerId: string
	intentId: string
	saleId: string
}): Promise<CardOutcome | null> {
	try {
		await stopAskingForCard(sale)
	} catch (error) {
		log.warn({ err: error, saleId: sale.saleId }, "the payment of a sale could not be closed")
	}
	const outcome = await findCardOutcome({ intentId: sale.intentId }).catch(() => null)
	return outcome?.state === "paid" || outcome?.state === "expired" ? outcome : null
}

async function putBackOnTable(tx: Tx, query: GiveUp, closedIntentId: string | null): Promise<GivingUp> {
	const { producerId, dayId, viewer, saleId } = query
	const items = await findSaleItems(tx, query)
	// The same locks as a sale takes, in the same order: who sells these pieces now waits until they are back.
	await lockProducts(tx, { producerId, productIds: items.map(({ productId }) => productId) })
	const [sale] = await tx
		.select({ state: sales.state, intentId: sales.stripePaymentIntentId })
		.from(sales)
		.where(isSale(query))
		.for("update")
	if (sale?.state === "paid") return { ok: false, reason: "already-paid" }
	if (sale?.state === "given-up") return { ok: true, items }
	// Another try was begun meanwhile: its payment is still open.
	if (sale?.intentId !== closedIntentId) return { ok: false, reason: "no-answer" }
	await tx.update(sales).set({ state: "given-up", declineMessage: "" }).where(isSale(query))
	const pieces = await tx
		.select()
		.from(saleLineLots)
		.where(and(eq(saleLineLots.producerId, producerId), eq(saleLineLots.saleId, saleId)))
		.orderBy(asc(saleLineLots.lotId))
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
	return { ok: true, items }
}

function isSale({ producerId, dayId, saleId }: GiveUp) {
	return and(eq(sales.producerId, producerId), eq(sales.id, saleId), eq(sales.marketDayId, dayId))
}
