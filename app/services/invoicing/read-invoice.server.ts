import { and, asc, desc, eq } from "drizzle-orm"
import {
	invoiceLines,
	invoiceOrders,
	invoices,
	onlinePaymentParts,
	onlinePayments,
	orders,
	producers,
	stores,
	users,
} from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { parseInvoiceNumber } from "~/domain/invoicing/invoice-number"
import { formatMoney } from "~/domain/money"
import { weightWords } from "~/domain/weight"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { InvoiceProps } from "~emails/documents/invoice-props"
import { KEEP_COMB, NOT_FOR_INFANTS } from "~emails/words"

/** An invoice as its page shows it: the document itself, and what the buttons beside it need. */
export type InvoicePage = {
	document: InvoiceProps
	orderNumber: number
	openCents: number
	/** The bank's words when the last try to pay by card was refused and nothing has been paid since. */
	declineMessage: string
	/** The visits to the card page that have not been paid, as far as is known: their ids. */
	unpaidVisits: string[]
	/** How to keep what was delivered, and the caution that belongs to it. */
	care: string
}

/**
 * Reads one invoice by its printed number. With `storeId` it must be that store's. Null when there is none: a foreign
 * invoice is as good as none. Page, letter and PDF are all drawn from what this answers.
 */
export async function readInvoice(
	tx: Tx,
	query: { producerId: string; storeId?: string; number: string },
): Promise<InvoicePage | null> {
	const { producerId, storeId, number } = query
	const named = parseInvoiceNumber(number)
	if (!named) return null
	const [found] = await tx
		.select({ invoice: invoices, store: stores, order: orders, orderedBy: users.name, timeZone: producers.timeZone })
		.from(invoices)
		.innerJoin(stores, and(eq(stores.producerId, invoices.producerId), eq(stores.id, invoices.storeId)))
		.innerJoin(
			invoiceOrders,
			and(eq(invoiceOrders.producerId, invoices.producerId), eq(invoiceOrders.invoiceId, invoices.id)),
		)
		.innerJoin(orders, and(eq(orders.producerId, invoiceOrders.producerId), eq(orders.id, invoiceOrders.orderId)))
		.innerJoin(producers, eq(producers.id, invoices.producerId))
		.leftJoin(users, eq(users.id, orders.placedBy))
		.where(
			and(
				eq(invoices.producerId, producerId),
				eq(invoices.year, named.year),
				eq(invoices.sequence, named.sequence),
				storeId ? eq(invoices.storeId, storeId) : undefined,
			),
		)
	if (!found) return null
	const { invoice, store, order, orderedBy, timeZone } = found
	const lines = await tx
		.select()
		.from(invoiceLines)
		.where(and(eq(invoiceLines.producerId, producerId), eq(invoiceLines.invoiceId, invoice.id)))
		.orderBy(asc(invoiceLines.position))
	const yard = await findYard(tx, producerId)
	const visits = await tx
		.select({ id: onlinePayments.id, state: onlinePayments.state, declineMessage: onlinePayments.declineMessage })
		.from(onlinePaymentParts)
		.innerJoin(
			onlinePayments,
			and(
				eq(onlinePayments.producerId, onlinePaymentParts.producerId),
				eq(onlinePayments.id, onlinePaymentParts.onlinePaymentId),
			),
		)
		.where(and(eq(onlinePaymentParts.producerId, producerId), eq(onlinePaymentParts.invoiceId, invoice.id)))
		.orderBy(desc(onlinePayments.createdAt))
	const openCents = invoice.openCents
	const reasons = shortReasons(invoice.shortNote, lines)
	return {
		orderNumber: order.number,
		openCents,
		declineMessage: openCents > 0 && visits[0]?.state === "declined" ? visits[0].declineMessage : "",
		unpaidVisits: visits.filter(({ state }) => state !== "paid").map(({ id }) => id),
		care: `${KEEP_COMB} ${NOT_FOR_INFANTS}`,
		document: {
			yard: letterHead(yard),
			number,
			issuedOn: invoice.issuedOn,
			store: { name: store.name, contactName: orderedBy, address: store.address || null },
			order: { number: String(order.number), placedOn: dayInZone(order.placedAt, timeZone) },
			delivered: {
				on: order.deliveryOn,
				netWeight: weightWords(lines.reduce((sum, line) => sum + line.netGrams, 0)),
			},
			due: {
				on: invoice.dueOn,
				termsWords: invoice.termsWords,
			},
			waysToPay: "Card or check",
			lines: lines.map((line) => ({
				sheetNumber: line.code,
				productName: line.name,
				productNote: line.detail || null,
				lots: line.lotCodes ? line.lotCodes.split(", ") : [],
				netWeight: weightWords(line.netGrams),
				casesAsked: line.askedCases,
				casesSent: line.sentCases,
				priceCents: line.caseCents,
				amountCents: line.lineCents,
				reason: reasons.get(line.id) ?? null,
			})),
			charges: [
				{ label: deliveryLabel(invoice.deliveryCents, store.freeAboveCents), cents: invoice.deliveryCents },
				{ label: invoice.isForResale ? "Bought for resale: no sales tax" : "Sales tax", cents: invoice.taxCents },
			],
			totalCents: invoice.totalCents,
			paidCents: invoice.paidCents,
			notes: yard.invoiceNote === "" ? [] : [yard.invoiceNote],
		},
	}
}

function deliveryLabel(deliveryCents: number, freeAboveCents: number | null): string {
	if (deliveryCents > 0 || freeAboveCents === null) return "Delivery"
	return `Delivery, free from ${formatMoney(freeAboveCents)}`
}

/**
 * Why each line is short, by line id: the note has one sentence to a line, in the order of the short lines. A note that
 * was written as a whole stands for all of them.
 */
function shortReasons(
	shortNote: string,
	lines: readonly { id: string; askedCases: number; sentCases: number }[],
): Map<string, string> {
	if (shortNote === "") return new Map()
	const short = lines.filter((line) => line.sentCases < line.askedCases)
	const sentences = shortNote.split("\n")
	const isOneToALine = sentences.length === short.length
	return new Map(short.map((line, index) => [line.id, (isOneToALine && sentences[index]) || sentences.join(" ")]))
}
