import { and, desc, eq, gt, inArray, ne, or, sql } from "drizzle-orm"
import { invoices, onlinePaymentParts, onlinePayments } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { parseInvoiceNumber } from "~/domain/invoicing/invoice-number"

export type OpenInvoice = { openCents: number }

/** A visit to the card page; `sessionId` is null until the page has been opened. */
type Visit = { id: string; sessionId: string | null }

type TakenUp =
	| { ok: true; visit: Visit; invoice: OpenInvoice }
	| { ok: false; reason: "no-such-invoice" | "nothing-open" }

/**
 * The visit under which an invoice is to be paid: the one that is open for the amount still owed, else a new one. One
 * whose page was never opened is taken up only within a minute, as the other half of a double click: afterwards its
 * key may be spent on an answer that failed. The invoice stays locked meanwhile, so that two clicks find one visit.
 */
export async function takeUpVisit(query: {
	producerId: string
	storeId: string
	invoiceNumber: string
	personId: string
}): Promise<TakenUp> {
	const { producerId, storeId } = query
	const named = parseInvoiceNumber(query.invoiceNumber)
	if (!named) return { ok: false, reason: "no-such-invoice" }
	return withProducer(producerId, async (tx) => {
		const [invoice] = await tx
			.select()
			.from(invoices)
			.where(
				and(
					eq(invoices.producerId, producerId),
					eq(invoices.storeId, storeId),
					eq(invoices.year, named.year),
					eq(invoices.sequence, named.sequence),
				),
			)
			.for("update")
		if (!invoice) return { ok: false, reason: "no-such-invoice" }
		const openCents = invoice.openCents
		if (openCents <= 0) return { ok: false, reason: "nothing-open" }
		const [open] = await tx
			.select({ id: onlinePayments.id, sessionId: onlinePayments.stripeSessionId })
			.from(onlinePayments)
			.innerJoin(
				onlinePaymentParts,
				and(
					eq(onlinePaymentParts.producerId, onlinePayments.producerId),
					eq(onlinePaymentParts.onlinePaymentId, onlinePayments.id),
				),
			)
			.where(
				and(
					eq(onlinePayments.producerId, producerId),
					eq(onlinePaymentParts.invoiceId, invoice.id),
					eq(onlinePayments.amountCents, openCents),
					inArray(onlinePayments.state, ["open", "declined"]),
					or(
						sql`${onlinePayments.stripeSessionId} is not null`,
						gt(onlinePayments.createdAt, sql`now() - interval '1 minute'`),
					),
				),
			)
			.orderBy(desc(onlinePayments.createdAt))
			.limit(1)
		if (open) return { ok: true, visit: open, invoice: { openCents } }
		const [made] = await tx
			.insert(onlinePayments)
			.values({ producerId, storeId, amountCents: openCents, startedBy: query.personId })
			.returning({ id: onlinePayments.id })
		if (!made) throw new Error("an insert returns its row")
		const part = { producerId, onlinePaymentId: made.id, invoiceId: invoice.id, amountCents: openCents }
		await tx.insert(onlinePaymentParts).values(part)
		return { ok: true, visit: { id: made.id, sessionId: null }, invoice: { openCents } }
	})
}

/** Writes down which page was opened for a visit; one that another click had given up meanwhile is open again. */
export async function storeSession(query: { producerId: string; visitId: string; sessionId: string }): Promise<void> {
	await withProducer(query.producerId, (tx) =>
		tx
			.update(onlinePayments)
			.set({
				stripeSessionId: query.sessionId,
				state: sql`case ${onlinePayments.state} when 'expired' then 'open' else ${onlinePayments.state} end`,
			})
			.where(and(eq(onlinePayments.producerId, query.producerId), eq(onlinePayments.id, query.visitId))),
	)
}

/** Gives a visit up: it is not taken up again. Should it turn out paid after all, its event still settles it. */
export async function closeVisit(query: { producerId: string; visitId: string }): Promise<void> {
	await withProducer(query.producerId, (tx) =>
		tx
			.update(onlinePayments)
			.set({ state: "expired" })
			.where(
				and(
					eq(onlinePayments.producerId, query.producerId),
					eq(onlinePayments.id, query.visitId),
					ne(onlinePayments.state, "paid"),
				),
			),
	)
}
