import { and, eq, sql } from "drizzle-orm"
import { cardPayments, invoices, orderEvents, paymentParts, payments } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { CardOutcome } from "~/platform/card-outcome.server"
import { queueReceipt } from "./queue-receipt.server"

/**
 * Brings one visit to the card page to what Stripe says of it, and when it was paid writes the payment, settles the
 * invoice with it and queues the receipt. Moves only forward: paid stays paid. Running it again, or two at once,
 * changes nothing more: the row is locked and the payment carries Stripe's id, which is there once. What is above the
 * open amount (paid from two tabs) stays on the store's account.
 */
export async function settleCardPayment(
	tx: Tx,
	query: { producerId: string; cardPaymentId: string; outcome: CardOutcome },
): Promise<void> {
	const { producerId, cardPaymentId, outcome } = query
	const isVisit = and(eq(cardPayments.producerId, producerId), eq(cardPayments.id, cardPaymentId))
	const [visit] = await tx.select().from(cardPayments).where(isVisit).for("update")
	if (!visit || visit.state === "paid") return
	await tx
		.update(cardPayments)
		.set({
			state: outcome.state,
			declineMessage: outcome.declineMessage,
			stripePaymentIntentId: outcome.intentId ?? visit.stripePaymentIntentId,
		})
		.where(isVisit)
	if (outcome.state !== "paid" || !outcome.intentId) return

	const isInvoice = and(eq(invoices.producerId, producerId), eq(invoices.id, visit.invoiceId))
	const [invoice] = await tx.select().from(invoices).where(isInvoice).for("update")
	if (!invoice) throw new Error("a card payment names an invoice that is there")
	const [payment] = await tx
		.insert(payments)
		.values({
			producerId,
			storeId: invoice.storeId,
			method: "card",
			amountCents: outcome.paidCents,
			stripePaymentIntentId: outcome.intentId,
			enteredBy: visit.startedBy,
		})
		.onConflictDoNothing()
		.returning({ id: payments.id, receivedAt: payments.receivedAt })
	if (!payment) return
	const settledCents = Math.min(outcome.paidCents, invoice.totalCents - invoice.paidCents)
	if (settledCents > 0) {
		await tx
			.insert(paymentParts)
			.values({ producerId, paymentId: payment.id, invoiceId: invoice.id, amountCents: settledCents })
		await tx
			.update(invoices)
			.set({ paidCents: sql`${invoices.paidCents} + ${settledCents}` })
			.where(isInvoice)
	}
	await tx.insert(orderEvents).values({
		producerId,
		orderId: invoice.orderId,
		kind: "paid",
		userId: visit.startedBy,
		detail: { invoiceId: invoice.id, amountCents: outcome.paidCents },
	})
	await queueReceipt(tx, {
		producerId,
		paymentId: payment.id,
		invoiceId: invoice.id,
		userId: visit.startedBy,
		amountCents: outcome.paidCents,
		settledCents: Math.max(0, settledCents),
		paidAt: payment.receivedAt,
	})
}
