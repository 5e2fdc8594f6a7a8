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
import { percentWords } from "~/domain/invoicing/percent-words"
import { shortReasons } from "~/domain/invoicing/short-reasons"
import { discountCents } from "~/domain/invoicing/terms"
import { weighedWords } from "~/domain/invoicing/weighed-words"
import { formatMoney } from "~/domain/money"
import { weightWords } from "~/domain/weight"
import { now } from "~/platform/clock.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { InvoiceProps } from "~emails/documents/invoice-props"
import { KEEP_COMB, NOT_FOR_INFANTS } from "~emails/words"

/** An invoice as its page shows it: the document itself, and what the buttons beside it need. */
export type InvoicePage = {
	document: InvoiceProps
	/** The orders that it is about; none on a charge. */
	orderNumbers: number[]
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
		.select({ invoice: invoices, store: stores, timeZone: producers.timeZone })
		.from(invoices)
		.innerJoin(stores, and(eq(stores.producerId, invoices.producerId), eq(stores.id, invoices.storeId)))
		.innerJoin(producers, eq(producers.id, invoices.producerId))
		.where(
			and(
				eq(invoices.producerId, producerId),
				eq(invoices.year, named.year),
				eq(invoices.sequence, named.sequence),
				storeId ? eq(invoices.storeId, storeId) : undefined,
			),
		)
	if (!found) return null
	const { invoice, store, timeZone } = found
	const about = await findOrders(tx, { producerId, invoiceId: invoice.id })
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
	const { openCents } = invoice
	const reasons = shortReasons(invoice.shortNote, lines)
	const numbers = new Map(about.map((order) => [order.id, String(order.number)]))
	const [first] = about
	const last = about.at(-1)
	return {
		orderNumbers: about.map((order) => order.number),
		openCents,
		declineMessage: openCents > 0 && visits[0]?.state === "declined" ? visits[0].declineMessage : "",
		unpaidVisits: visits.filter(({ state }) => state !== "paid").map(({ id }) => id),
		care: `${KEEP_COMB} ${NOT_FOR_INFANTS}`,
		document: {
			yard: letterHead(yard),
			number,
			issuedOn: invoice.issuedOn,
			store: { name: store.name, contactName: first?.orderedBy ?? null, address: store.address || null },
			order: first && { number: String(first.number), placedOn: dayInZone(first.placedAt, timeZone) },
			orders: about.map((order) => ({
				number: String(order.number),
				placedOn: dayInZone(order.placedAt, timeZone),
				deliveredOn: order.deliveryOn,
				poNumber: order.poNumber || null,
			})),
			poNumbers: invoice.poNumbers || null,
			delivered: last && {
				from: first?.deliveryOn ?? null,
				on: last.deliveryOn,
				netWeight: weightWords(lines.reduce((sum, line) => sum + line.netGrams, 0)),
			},
			due: { on: invoice.dueOn, termsWords: invoice.termsWords },
			discount: takeableDiscount(invoice, dayInZone(now(), timeZone)),
			waysToPay: "Card, bank or check",
			lines: lines.map((line, index) => ({
				sheetNumber: line.code || null,
				productName: line.name,
				productNote: line.detail || null,
				lots: line.lotCodes ? line.lotCodes.split(", ") : [],
				netWeight: lineWeight(line),
				casesAsked: line.askedCases,
				casesSent: line.sentCases,
				priceCents: line.caseCents,
				poundCents: line.poundCents,
				amountCents: line.lineCents,
				reason: reasons[index] ?? null,
				orderNumber: (line.orderId && numbers.get(line.orderId)) || null,
			})),
			charges: invoice.kind === "goods" ? chargesOf(invoice, store) : [],
			totalCents: invoice.totalCents,
			paidCents: invoice.paidCents,
			creditedCents: invoice.creditedCents,
			discountTakenCents: invoice.discountCents,
			writtenOffCents: invoice.writtenOffCents,
			notes: yard.invoiceNote === "" ? [] : [yard.invoiceNote],
		},
	}
}

type InvoiceRow = typeof invoices.$inferSelect

function findOrders(tx: Tx, query: { producerId: string; invoiceId: string }) {
	return tx
		.select({
			id: orders.id,
			number: orders.number,
			placedAt: orders.placedAt,
			deliveryOn: orders.deliveryOn,
			poNumber: orders.poNumber,
			orderedBy: users.name,
		})
		.from(invoiceOrders)
		.innerJoin(orders, and(eq(orders.producerId, invoiceOrders.producerId), eq(orders.id, invoiceOrders.orderId)))
		.leftJoin(users, eq(users.id, orders.placedBy))
		.where(and(eq(invoiceOrders.producerId, query.producerId), eq(invoiceOrders.invoiceId, query.invoiceId)))
		.orderBy(asc(orders.deliveryOn), asc(orders.number))
}

/** The discount that whoever pays the rest on `today` may take; null when there is none, or no more. */
function takeableDiscount(invoice: InvoiceRow, today: string) {
	const { discountUntil: untilOn, discountBasisPoints: basisPoints, openCents } = invoice
	if (untilOn === null || today > untilOn || invoice.discountCents > 0) return null
	const cents = discountCents({ discountBasisPoints: basisPoints }, invoice.totalCents - invoice.creditedCents)
	return cents > 0 && cents < openCents ? { basisPoints, cents, untilOn } : null
}

function lineWeight(line: typeof invoiceLines.$inferSelect): string | null {
	if (line.netGrams === 0) return null
	return line.poundCents === null ? weightWords(line.netGrams) : weighedWords(line.netGrams)
}

function chargesOf(invoice: InvoiceRow, store: { freeAboveCents: number | null }) {
	return [
		{ label: deliveryLabel(invoice.deliveryCents, store.freeAboveCents), cents: invoice.deliveryCents },
		{ label: taxLabel(invoice), cents: invoice.taxCents },
	]
}

function deliveryLabel(deliveryCents: number, freeAboveCents: number | null): string {
	if (deliveryCents > 0 || freeAboveCents === null) return "Delivery"
	return `Delivery, free from ${formatMoney(freeAboveCents)}`
}

/** "Sales tax, Teasel County, 7.25 %". */
function taxLabel({ isForResale, taxCents, taxPlace, taxBasisPoints }: InvoiceRow): string {
	if (isForResale) return "Bought for resale: no sales tax"
	if (taxCents === 0) return "Sales tax"
	return ["Sales tax", taxPlace, taxBasisPoints > 0 && percentWords(taxBasisPoints)].filter(Boolean).join(", ")
}
