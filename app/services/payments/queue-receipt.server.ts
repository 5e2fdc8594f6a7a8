import { and, eq } from "drizzle-orm"
import { invoices, producers, stores, users } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

/** Queues the receipt of a card payment to the person who paid: once for each payment. */
export async function queueReceipt(
	tx: Tx,
	payment: {
		producerId: string
		paymentId: string
		invoiceId: string
		userId: string
		amountCents: number
		settledCents: number
		paidAt: Date
	},
): Promise<void> {
	const { producerId } = payment
	const [row] = await tx
		.select({
			email: users.email,
			storeName: stores.name,
			storeSlug: stores.slug,
			producerSlug: producers.slug,
			timeZone: producers.timeZone,
			year: invoices.year,
			sequence: invoices.sequence,
			openCents: invoices.openCents,
		})
		.from(invoices)
		.innerJoin(stores, and(eq(stores.producerId, invoices.producerId), eq(stores.id, invoices.storeId)))
		.innerJoin(producers, eq(producers.id, invoices.producerId))
		.innerJoin(users, eq(users.id, payment.userId))
		.where(and(eq(invoices.producerId, producerId), eq(invoices.id, payment.invoiceId)))
	if (!row) throw new Error("a payment names an invoice and a person that are there")
	const applied = {
		invoiceNumber: invoiceNumber(row.year, row.sequence),
		cents: payment.settledCents,
		openCents: row.openCents,
	}
	await queueMail(tx, {
		producerId,
		to: row.email,
		onceKey: `payment-received:${payment.paymentId}`,
		template: "payment-received",
		props: {
			yard: letterHead(await findYard(tx, producerId)),
			sentTo: row.email,
			storeName: row.storeName,
			amountCents: payment.amountCents,
			paidOn: dayInZone(payment.paidAt, row.timeZone),
			way: "card",
			applied: payment.settledCents > 0 ? [applied] : [],
			onAccountCents: payment.amountCents - payment.settledCents,
			invoicesUrl: `${env.BASE_URL}/buy/${row.producerSlug}/${row.storeSlug}/invoices`,
		},
	})
}
