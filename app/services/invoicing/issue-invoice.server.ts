import { auditEntries, invoiceLines, invoiceOrders, invoices, orderEvents } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { takeNumber } from "~/services/numbers/take-number.server"
import { findStorePeople } from "~/services/orders/order-people.server"
import type { InvoicePlan } from "./plan-invoice.server"
import { readInvoice } from "./read-invoice.server"

type Issuing = {
	producer: { id: string; slug: string }
	plan: InvoicePlan
	/** Null when a job issues it. */
	personId: string | null
	/** Of an invoice that is to be made once, however often that is tried; the database refuses a second. */
	onceKey?: string
}

/**
 * Writes a planned invoice under the next number of its year, notes it on every order that it is about, and mails it with
 * its PDF to the store's people. Answers the number as printed. The database refuses a second invoice of an order.
 */
export async function issueInvoice(tx: Tx, { producer, plan, personId, onceKey }: Issuing): Promise<string> {
	const year = Number(plan.invoice.issuedOn.slice(0, 4))
	// Last of the locks, since every other invoice of the year waits for it; a rollback gives the number back.
	const sequence = await takeNumber(tx, { producerId: producer.id, series: "invoice", year })
	const [invoice] = await tx
		.insert(invoices)
		.values({ ...plan.invoice, year, sequence, onceKey: onceKey ?? null })
		.returning({ id: invoices.id })
	if (!invoice) throw new Error("an insert returns its row")
	const ofProducer = { producerId: producer.id }
	await tx
		.insert(invoiceOrders)
		.values(plan.orders.map(({ id }) => ({ ...ofProducer, orderId: id, invoiceId: invoice.id })))
	if (plan.lines.length > 0)
		await tx
			.insert(invoiceLines)
			.values(plan.lines.map((line, index) => ({ ...line, invoiceId: invoice.id, position: index + 1 })))
	const number = invoiceNumber(year, sequence)
	await recordOnOrders(tx, { producerId: producer.id, orders: plan.orders, personId, number })
	await mailInvoice(tx, { producer, store: plan.store, number })
	return number
}

async function recordOnOrders(
	tx: Tx,
	query: { producerId: string; orders: InvoicePlan["orders"]; personId: string | null; number: string },
): Promise<void> {
	const { producerId, orders, personId: userId, number } = query
	const detail = { invoiceNumber: number }
	await tx
		.insert(orderEvents)
		.values(orders.map(({ id }) => ({ producerId, orderId: id, kind: "invoiced" as const, userId, detail })))
	const entry = { producerId, userId, action: "order invoiced", subjectType: "order", detail }
	await tx.insert(auditEntries).values(orders.map(({ id }) => ({ ...entry, subjectId: id })))
}

/** Mails an issued invoice with its PDF to the store’s people, once each. */
export async function mailInvoice(
	tx: Tx,
	query: { producer: { id: string; slug: string }; store: { id: string; slug: string }; number: string },
): Promise<void> {
	const { producer, store, number } = query
	const invoice = await readInvoice(tx, { producerId: producer.id, storeId: store.id, number })
	if (!invoice) throw new Error("the invoice has just been written")
	const page = `${env.BASE_URL}/buy/${producer.slug}/${store.slug}/invoices/${number}`
	const people = await findStorePeople(tx, { producerId: producer.id, storeId: store.id, kind: "invoices" })
	await queueMails(
		tx,
		producer.id,
		people.map((person) => ({
			to: person.email,
			onceKey: `invoice:${number}`,
			template: "invoice" as const,
			props: { invoice: invoice.document, sentTo: person.email, payUrl: page, pdfUrl: `${page}.pdf` },
		})),
	)
}
