import { and, eq } from "drizzle-orm"
import { sales } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { askForCard, closePayment, openReaderPayment } from "~/platform/card-reader.server"
import { log } from "~/platform/log.server"
import type { MarketDay } from "./find-market-days.server"

export type PuttingOnReader = { ok: true } | { ok: false; reason: "reader-away" } | { ok: false; reason: "reader-busy" }

/**
 * Puts an open sale on the market's card reader. `after` is the try that failed, for another one: said twice, it is one
 * more try and not two. A try after a declined card opens a payment of its own, so that late news of the declined one
 * does not touch it. The payment is written down before the reader asks for it. A sale that is not open, or not of this
 * day, is left as it is.
 */
export async function putOnReader(query: {
	producerId: string
	day: MarketDay
	saleId: string
	after?: number
}): Promise<PuttingOnReader> {
	const { producerId, day, saleId } = query
	try {
		const sale = await beginTry(query)
		if (!sale) return { ok: true }
		if (sale.declinedIntentId) await dropPayment(sale.declinedIntentId)
		const key = `${saleId}-${sale.attempt}`
		const intentId = sale.intentId ?? (await openPayment({ producerId, saleId, key, amountCents: sale.totalCents }))
		if (!intentId) return { ok: true }
		const answer = await askForCard({ readerId: day.readerId, intentId, key })
		return answer === "busy" ? { ok: false, reason: "reader-busy" } : { ok: true }
	} catch (error) {
		log.warn({ err: error, saleId }, "the card reader did not take the sale")
		return { ok: false, reason: "reader-away" }
	}
}

function beginTry(query: { producerId: string; day: MarketDay; saleId: string; after?: number }) {
	const { producerId, day, saleId, after } = query
	const isSale = and(eq(sales.producerId, producerId), eq(sales.id, saleId), eq(sales.marketDayId, day.id))
	return withProducer(producerId, async (tx) => {
		const [sale] = await tx
			.select()
			.from(sales)
			.where(and(isSale, eq(sales.state, "open")))
			.for("update")
		if (!sale) return null
		const { totalCents, stripePaymentIntentId: intentId } = sale
		if (sale.attempt !== after) return { attempt: sale.attempt, intentId, totalCents, declinedIntentId: null }
		const wasDeclined = sale.declineMessage !== ""
		const next = { attempt: sale.attempt + 1, declineMessage: "", stripePaymentIntentId: wasDeclined ? null : intentId }
		await tx.update(sales).set(next).where(isSale)
		return {
			attempt: next.attempt,
			intentId: next.stripePaymentIntentId,
			totalCents,
			declinedIntentId: wasDeclined ? intentId : null,
		}
	})
}

/** Opens the payment and writes it down; null when the sale was given up meanwhile, and no card may pay it. */
async function openPayment(sale: {
	producerId: string
	saleId: string
	key: string
	amountCents: number
}): Promise<string | null> {
	const { producerId, saleId, key, amountCents } = sale
	const intentId = await openReaderPayment({
		key,
		amountCents,
		metadata: { producer_id: producerId, sale_id: saleId },
	})
	const written = await withProducer(producerId, (tx) =>
		tx
			.update(sales)
			.set({ stripePaymentIntentId: intentId })
			.where(and(eq(sales.producerId, producerId), eq(sales.id, saleId), eq(sales.state, "open")))
			.returning({ id: sales.id }),
	)
	return written.length > 0 ? intentId : null
}

/** A declined payment is on no reader, so it can stay open if it must; closing it keeps the books at Stripe tidy. */
async function dropPayment(intentId: string): Promise<void> {
	await closePayment(intentId).catch((error: unknown) => log.warn({ err: error, intentId }, "a payment stays open"))
}
