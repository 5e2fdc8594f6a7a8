import { and, desc, eq, gt, inArray, ne, or, sql } from "drizzle-orm"
import { cardPayments, invoices } from "~/db/schema"
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
		const openCents = invoice.totalCents - invoice.paidCents
		if (openCents <= 0) return { ok: false, reason: "nothing-open" }
		const [open] = await tx
			.select({ id: cardPayments.id, sessionId: cardPayments.stripeSessionId })
			.from(cardPayments)
			.where(
				and(
					eq(cardPayments.producerId, producerId),
					eq(cardPayments.invoiceId, invoice.id),
					eq(cardPayments.amountCents, openCents),
					inArray(cardPayments.state, ["open", "declined"]),
					or(
						sql`${cardPayments.stripeSessionId} is not null`,
						gt(cardPayments.createdAt, sql`now() - interval '1 minute'`),
					),
				),
			)
			.orderBy(desc(cardPayments.createdAt))
			.limit(1)
		if (open) return { ok: true, visit: open, invoice: { openCents } }
		const [made] = await tx
			.insert(cardPayments)
			.values({ producerId, invoiceId: invoice.id, amountCents: openCents, startedBy: query.personId })
			.returning({ id: cardPayments.id })
		if (!made) throw new Error("an insert returns its row")
		return { ok: true, visit: { id: made.id, sessionId: null }, invoice: { openCents } }
	})
}

/** Writes down which page was opened for a visit; one that another click had given up meanwhile is open again. */
export async function storeSession(query: { producerId: string; visitId: string; sessionId: string }): Promise<void> {
	await withProducer(query.producerId, (tx) =>
		tx
			.update(cardPayments)
			.set({
				stripeSessionId: query.sessionId,
				state: sql`case ${cardPayments.state} when 'expired' then 'open' else ${cardPayments.state} end`,
			})
			.where(and(eq(cardPayments.producerId, query.producerId), eq(cardPayments.id, query.visitId))),
	)
}

/** Gives a visit up: it is not taken up again. Should it turn out paid after all, its event still settles it. */
export async function closeVisit(query: { producerId: string; visitId: string }): Promise<void> {
	await withProducer(query.producerId, (tx) =>
		tx
			.update(cardPayments)
			.set({ state: "expired" })
			.where(
				and(
					eq(cardPayments.producerId, query.producerId),
					eq(cardPayments.id, query.visitId),
					ne(cardPayments.state, "paid"),
				),
			),
	)
}
