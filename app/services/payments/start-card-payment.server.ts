import { and, eq, gt, sql } from "drizzle-orm"
import { cardPayments, invoices } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { parseInvoiceNumber } from "~/domain/invoicing/invoice-number"
import { openCardPage } from "~/platform/card-page.server"
import { env } from "~/platform/env.server"
import { log } from "~/platform/log.server"

export type CardPaymentStart =
	| { ok: true; url: string }
	| { ok: false; reason: "no-such-invoice" | "nothing-open" | "no-answer" }

/**
 * Sends a person to the hosted card page for what is open on an invoice. An open visit for the same amount is taken up
 * again under the same key, so that a double click, a second tab or a lost answer leads to one page and one charge.
 * `no-answer` when the payment service cannot be reached: nothing was charged, and trying again is safe.
 */
export async function startCardPayment(query: {
	producer: { id: string; slug: string; name: string }
	store: { id: string; slug: string }
	invoiceNumber: string
	personId: string
	personEmail: string
}): Promise<CardPaymentStart> {
	const { producer, store } = query
	const named = parseInvoiceNumber(query.invoiceNumber)
	if (!named) return { ok: false, reason: "no-such-invoice" }
	const visit = await withProducer(producer.id, async (tx) => {
		const [invoice] = await tx
			.select()
			.from(invoices)
			.where(
				and(
					eq(invoices.producerId, producer.id),
					eq(invoices.storeId, store.id),
					eq(invoices.year, named.year),
					eq(invoices.sequence, named.sequence),
				),
			)
			.for("update")
		if (!invoice) return { ok: false, reason: "no-such-invoice" } as const
		const openCents = invoice.totalCents - invoice.paidCents
		if (openCents <= 0) return { ok: false, reason: "nothing-open" } as const
		const [open] = await tx
			.select({ id: cardPayments.id })
			.from(cardPayments)
			.where(
				and(
					eq(cardPayments.producerId, producer.id),
					eq(cardPayments.invoiceId, invoice.id),
					eq(cardPayments.amountCents, openCents),
					sql`${cardPayments.state} in ('open', 'declined')`,
					// The card page itself closes after a day; a visit that old is not taken up again.
					gt(cardPayments.createdAt, sql`now() - interval '23 hours'`),
				),
			)
			.limit(1)
		if (open) return { ok: true, id: open.id, openCents } as const
		const [made] = await tx
			.insert(cardPayments)
			.values({ producerId: producer.id, invoiceId: invoice.id, amountCents: openCents, startedBy: query.personId })
			.returning({ id: cardPayments.id })
		if (!made) throw new Error("an insert returns its row")
		return { ok: true, id: made.id, openCents } as const
	})
	if (!visit.ok) return visit
	const page = `${env.BASE_URL}/buy/${producer.slug}/${store.slug}/invoices/${query.invoiceNumber}`
	try {
		const session = await openCardPage({
			key: visit.id,
			amountCents: visit.openCents,
			title: `${producer.name}, invoice ${query.invoiceNumber}`,
			email: query.personEmail,
			metadata: { producer_id: producer.id, card_payment_id: visit.id },
			paidUrl: `${page}?paid=${visit.id}`,
			backUrl: page,
		})
		await withProducer(producer.id, (tx) =>
			tx
				.update(cardPayments)
				.set({ stripeSessionId: session.id })
				.where(and(eq(cardPayments.producerId, producer.id), eq(cardPayments.id, visit.id))),
		)
		return { ok: true, url: session.url }
	} catch (error) {
		log.warn({ err: error, cardPaymentId: visit.id }, "the card page could not be opened")
		return { ok: false, reason: "no-answer" }
	}
}
