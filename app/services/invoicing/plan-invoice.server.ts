import { sql } from "drizzle-orm"
import type { invoiceLines, invoices } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceTotals } from "~/domain/invoicing/invoice-totals"
import { joinShortNotes } from "~/domain/invoicing/short-reasons"
import { dueDates, type Terms, termsWords } from "~/domain/invoicing/terms"
import { lineAmount } from "~/domain/pricing/weighed-line"
import type { LockedLine, LockedOrder } from "~/services/orders/lock-order.server"
import { findLotCodes, findShortNotes } from "./find-order-facts.server"
import { findTaxRate } from "./find-tax-rate.server"

/** An invoice that is worked out and not yet written: all but its number. */
export type InvoicePlan = {
	store: LockedOrder["store"]
	orders: readonly LockedOrder[]
	invoice: Omit<typeof invoices.$inferInsert, "id" | "year" | "sequence">
	lines: Omit<typeof invoiceLines.$inferInsert, "id" | "invoiceId" | "position">[]
}

/** Why orders cannot be invoiced as they are. */
export type InvoiceRefusal =
	| { ok: false; reason: "not-weighed"; orderNumber: number; productName: string }
	| { ok: false; reason: "no-tax-rate"; place: string }
	| { ok: false; reason: "books-closed"; until: Day }

/**
 * Works out one invoice of orders of one store, as they were packed: each line at the price of its order, comb priced by
 * weight by what was weighed; the delivery of each order; sales tax by the rate of the store's place on that day, unless
 * its resale certificate holds. Refused when comb priced by weight was not weighed, when the place has no rate that has
 * begun and something is to be taxed, and when the books of that day are closed. Writes nothing and takes no number.
 */
export async function planInvoice(
	tx: Tx,
	query: { producerId: string; orders: readonly LockedOrder[]; issuedOn: Day },
): Promise<{ ok: true; plan: InvoicePlan } | InvoiceRefusal> {
	const { producerId, orders, issuedOn } = query
	const [first] = orders
	if (!first) throw new Error("an invoice is about an order")
	const { store } = first
	const closed = await findClosedUntil(tx, producerId)
	if (closed !== null && issuedOn <= closed) return { ok: false, reason: "books-closed", until: closed }
	const unweighed = findUnweighed(orders)
	if (unweighed) return unweighed
	const sent = orders.flatMap((order) => order.lines.map((line) => ({ ...line, order })))
	const isForResale = store.resaleCertificateUntil !== null && store.resaleCertificateUntil >= issuedOn
	const rate = await findTaxRate(tx, { producerId, place: store.taxPlace, on: issuedOn })
	const isTaxed = !isForResale && sent.some((line) => line.product.isTaxable && sentCases(line) > 0)
	if (isTaxed && rate === null) return { ok: false, reason: "no-tax-rate", place: store.taxPlace }
	const taxBasisPoints = isForResale ? 0 : (rate ?? 0)
	const totals = invoiceTotals({
		lines: sent.map((line) => ({ amountCents: lineCents(line), isTaxable: line.product.isTaxable })),
		deliveryCents: orders.reduce((sum, order) => sum + order.deliveryCents, 0),
		isDeliveryTaxable: false,
		taxBasisPoints,
		isExempt: isForResale,
	})
	const orderIds = orders.map(({ id }) => id)
	const lotCodes = await findLotCodes(tx, { producerId, orderIds })
	const notes = await findShortNotes(tx, { producerId, orderIds })
	const terms = termsOf(store)
	const { dueOn, discountUntil } = dueDates(terms, issuedOn)
	return {
		ok: true,
		plan: {
			store,
			orders,
			invoice: {
				producerId,
				storeId: store.id,
				issuedOn,
				dueOn,
				discountUntil,
				discountBasisPoints: terms.discountBasisPoints,
				linesCents: totals.linesCents,
				deliveryCents: totals.deliveryCents,
				taxCents: totals.taxCents,
				totalCents: totals.totalCents,
				taxBasisPoints,
				taxPlace: store.taxPlace,
				poNumbers: [...new Set(orders.map(({ poNumber }) => poNumber).filter(Boolean))].join(", "),
				shortNote: joinShortNotes(
					orders.map((order) => ({
						note: notes.get(order.id) ?? "",
						lines: order.lines.map((line) => ({ askedCases: line.askedCases, sentCases: sentCases(line) })),
					})),
				),
				termsWords: termsWords(terms),
				isForResale,
			},
			lines: sent.map((line, index) => ({
				producerId,
				orderId: line.order.id,
				orderLineId: line.id,
				productId: line.productId,
				code: line.product.code,
				name: line.product.name,
				detail: line.product.detail,
				lotCodes: lotCodes.get(line.id) ?? "",
				netGrams: netGrams(line),
				askedCases: line.askedCases,
				sentCases: sentCases(line),
				caseCents: line.caseCents,
				poundCents: line.poundCents,
				lineCents: lineCents(line),
				taxCents: totals.lineTaxCents[index] ?? 0,
			})),
		},
	}
}

const sentCases = (line: LockedLine) => line.givenCases ?? 0

const amountOf = (line: LockedLine) => lineAmount({ ...line, cases: sentCases(line) })

const lineCents = (line: LockedLine) => amountOf(line).cents

function netGrams(line: LockedLine): number {
	if (line.poundCents !== null && sentCases(line) > 0) return line.weighedGrams ?? 0
	return sentCases(line) * line.piecesPerCase * line.product.pieceNetGrams
}

function findUnweighed(orders: readonly LockedOrder[]): InvoiceRefusal | null {
	for (const order of orders) {
		const line = order.lines.find((one) => amountOf(one).isEstimate)
		if (line) return { ok: false, reason: "not-weighed", orderNumber: order.number, productName: line.product.name }
	}
	return null
}

function termsOf(store: LockedOrder["store"]): Terms {
	return {
		kind: store.termsKind,
		days: store.termsDays,
		discountBasisPoints: store.termsDiscountBasisPoints,
		discountDays: store.termsDiscountDays,
	}
}

/** The last day of closed books, or null. An invoice that passes a closing in the same moment is refused by the database. */
export async function findClosedUntil(tx: Tx, producerId: string): Promise<Day | null> {
	const { rows } = await tx.execute<{ until: Day | null }>(sql`
		select max(closed_until)::text as until from book_closings where producer_id = ${producerId}`)
	return rows[0]?.until ?? null
}
