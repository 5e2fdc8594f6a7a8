import { and, eq, gt, inArray } from "drizzle-orm"
import { auditEntries, invoiceOrders, invoices, orderEvents, payments, settlements } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber, parseInvoiceNumber } from "~/domain/invoicing/invoice-number"
import { allocatePayment } from "~/domain/invoicing/payments"
import type { Result } from "~/domain/result"

export type HandMethod = "cheque" | "cash" | "transfer"

export type RecordedPayment = Result<
	{ settledInvoices: { number: string; cents: number }[]; onAccountCents: number },
	{ ok: false; reason: "no-such-invoice" }
>

/**
 * Notes money that came in by hand for an invoice: it settles that invoice first, then the store's others, the one due
 * first before the later; what is over stays on the store's account. `paymentId` is made with the form: a second send of
 * the same form finds the first payment and changes nothing.
 */
export async function recordPayment(query: {
	producerId: string
	invoiceNumber: string
	method: HandMethod
	amountCents: number
	personId: string
	paymentId: string
	/** The day it counts: when the money came in. */
	receivedOn: Day
}): Promise<RecordedPayment> {
	const { producerId, amountCents, paymentId, personId } = query
	const named = parseInvoiceNumber(query.invoiceNumber)
	if (!named) return { ok: false, reason: "no-such-invoice" }
	return withProducer(producerId, async (tx) => {
		const [about] = await tx
			.select({ id: invoices.id, storeId: invoices.storeId })
			.from(invoices)
			.where(
				and(eq(invoices.producerId, producerId), eq(invoices.year, named.year), eq(invoices.sequence, named.sequence)),
			)
		if (!about) return { ok: false, reason: "no-such-invoice" }
		const owed = await lockOpenInvoices(tx, { producerId, storeId: about.storeId })
		const [payment] = await tx
			.insert(payments)
			.values({
				producerId,
				id: paymentId,
				storeId: about.storeId,
				method: query.method,
				amountCents,
				receivedOn: query.receivedOn,
				enteredBy: personId,
			})
			.onConflictDoNothing()
			.returning({ id: payments.id })
		if (!payment) return readPayment(tx, { producerId, paymentId })
		const first = allocatePayment(
			amountCents,
			owed.filter((invoice) => invoice.id === about.id),
		)
		const rest = allocatePayment(
			first.onAccountCents,
			owed.filter((invoice) => invoice.id !== about.id),
		)
		const parts = [...first.parts, ...rest.parts]
		if (parts.length > 0) {
			await tx.insert(settlements).values(
				parts.map(({ invoiceId, cents }) => ({
					producerId,
					invoiceId,
					kind: "payment" as const,
					paymentId,
					amountCents: cents,
					settledOn: query.receivedOn,
					enteredBy: personId,
				})),
			)
		}
		await record(tx, { producerId, paymentId, personId, method: query.method, amountCents, parts })
		return readPayment(tx, { producerId, paymentId })
	})
}

/** The store's invoices with something open, locked in the order of their ids, which is the same for everyone. */
async function lockOpenInvoices(tx: Tx, query: { producerId: string; storeId: string }) {
	const rows = await tx
		.select()
		.from(invoices)
		.where(
			and(eq(invoices.producerId, query.producerId), eq(invoices.storeId, query.storeId), gt(invoices.openCents, 0)),
		)
		.orderBy(invoices.id)
		.for("update")
	return rows.map((row) => ({
		id: row.id,
		number: invoiceNumber(row.year, row.sequence),
		dueOn: row.dueOn,
		openCents: row.openCents,
	}))
}

async function record(
	tx: Tx,
	payment: {
		producerId: string
		paymentId: string
		personId: string
		method: HandMethod
		amountCents: number
		parts: readonly { invoiceId: string; cents: number }[]
	},
): Promise<void> {
	const { producerId, paymentId, personId, parts, ...detail } = payment
	if (parts.length > 0) {
		const about = await tx
			.select({ id: invoiceOrders.invoiceId, orderId: invoiceOrders.orderId })
			.from(invoiceOrders)
			.where(
				and(
					eq(invoiceOrders.producerId, producerId),
					inArray(
						invoiceOrders.invoiceId,
						parts.map(({ invoiceId }) => invoiceId),
					),
				),
			)
		await tx.insert(orderEvents).values(
			about.map(({ id, orderId }) => ({
				producerId,
				orderId,
				kind: "paid" as const,
				userId: personId,
				detail: { invoiceId: id, amountCents: parts.find(({ invoiceId }) => invoiceId === id)?.cents ?? 0 },
			})),
		)
	}
	await tx.insert(auditEntries).values({
		producerId,
		userId: personId,
		action: "record payment",
		subjectType: "payment",
		subjectId: paymentId,
		detail: { ...detail, parts },
	})
}

async function readPayment(tx: Tx, query: { producerId: string; paymentId: string }): Promise<RecordedPayment> {
	const { producerId, paymentId } = query
	const [payment] = await tx
		.select({ amountCents: payments.amountCents })
		.from(payments)
		.where(and(eq(payments.producerId, producerId), eq(payments.id, paymentId)))
	const parts = await tx
		.select({ year: invoices.year, sequence: invoices.sequence, cents: settlements.amountCents })
		.from(settlements)
		.innerJoin(invoices, and(eq(invoices.producerId, settlements.producerId), eq(invoices.id, settlements.invoiceId)))
		.where(and(eq(settlements.producerId, producerId), eq(settlements.paymentId, paymentId)))
		.orderBy(invoices.dueOn, invoices.year, invoices.sequence)
	const settled = parts.reduce((sum, part) => sum + part.cents, 0)
	return {
		ok: true,
		settledInvoices: parts.map((part) => ({ number: invoiceNumber(part.year, part.sequence), cents: part.cents })),
		onAccountCents: (payment?.amountCents ?? 0) - settled,
	}
}
