import { and, eq, sql } from "drizzle-orm"
import { sales } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { CardOutcome } from "~/platform/card-outcome.server"

/**
 * Brings an open card sale to what Stripe says of its payment. Moves only forward: a paid or given-up sale stays as it
 * is, and running it again changes nothing. A declined card is told on the sale, which stays open for another try; news
 * of a payment that a later try has replaced tells nothing.
 */
export async function settleSale(
	tx: Tx,
	query: { producerId: string; saleId: string; outcome: CardOutcome },
): Promise<void> {
	const { producerId, saleId, outcome } = query
	if (outcome.state === "open" || outcome.state === "expired" || !outcome.intentId) return
	const isOpen = and(eq(sales.producerId, producerId), eq(sales.id, saleId), eq(sales.state, "open"))
	if (outcome.state === "paid") {
		await tx
			.update(sales)
			.set({ state: "paid", paidAt: sql`now()`, declineMessage: "", stripePaymentIntentId: outcome.intentId })
			.where(isOpen)
		return
	}
	await tx
		.update(sales)
		.set({ declineMessage: outcome.declineMessage })
		.where(and(isOpen, eq(sales.stripePaymentIntentId, outcome.intentId)))
}
