import { and, eq } from "drizzle-orm"
import {
	invoiceOrders,
	invoices,
	onlinePaymentParts,
	onlinePayments,
	orderEvents,
	payments,
	producers,
	settlements,
} from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import type { CardOutcome } from "~/platform/card-outcome.server"
import { now } from "~/platform/clock.server"
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
	const isVisit = and(eq(onlinePayments.producerId, producerId), eq(onlinePayments.id, cardPaymentId))
	const [visit] = await tx.select().from(onlinePayments).where(isVisit).for("update")
	if (!visit || visit.state === "paid") return
	await tx
		.update(onlinePayments)
		.set({
			state: outcome.state,
			declineMessage: outcome.declineMessage,
			stripePaymentIntentId: outcome.intentId ?? visit.stripePaymentIntentId,
		})
		.where(isVisit)
	if (outcome.state !== "paid" || !outcome.intentId) return

	const [part] = await tx
		.select({ invoiceId: onlinePaymentParts.invoiceId, timeZone: producers.timeZone })
		.from(onlinePaymentParts)
		.innerJoin(producers, eq(producers.id, onlinePaymentParts.producerId))
		.where(and(eq(onlinePaymentParts.producerId, producerId), eq(onlinePaymentParts.onlinePaymentId, visit.id)))
	if (!part || !visit.startedBy) throw new Error("a visit names an invoice and a person")
	const isInvoice = and(eq(invoices.producerId, producerId), eq(invoices.id, part.invoiceId))
	const [invoice] = await tx.select().from(invoices).where(isInvoice).for("update")
	if (!invoice) throw new Error("a card payment names an invoice that is there")
	const receivedOn = dayInZone(now(), part.timeZone)
	const [payment] = await tx
		.insert(payments)
		.values({
			producerId,
			storeId: invoice.storeId,
			method: "card",
			amountCents: outcome.paidCents,
			receivedOn,
			stripePaymentIntentId: outcome.intentId,
			enteredBy: visit.startedBy,
		})
		.onConflictDoNothing()
		.returning({ id: payments.id, receivedAt: payments.receivedAt })
	if (!payment) return
	const settledCents = Math.min(outcome.paidCents, invoice.openCents)
	if (settledCents > 0) {
		await tx.insert(settlements).values({
			producerId,
			invoiceId: invoice.id,
			kind: "payment",
			paymentId: payment.id,
			amountCents: settledCents,
			settledOn: receivedOn,
			enteredBy: visit.startedBy,
		})
	}
	const about = await tx
		.select({ orderId: invoiceOrders.orderId })
		.from(invoiceOrders)
		.where(and(eq(invoiceOrders.producerId, producerId), eq(invoiceOrders.invoiceId, invoice.id)))
	if (about.length > 0) {
		await tx.insert(orderEvents).values(
			about.map(({ orderId }) => ({
				producerId,
				orderId,
				kind: "paid" as const,
				userId: visit.startedBy,
				detail: { invoiceId: invoice.id, amountCents: outcome.paidCents },
			})),
		)
	}
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
