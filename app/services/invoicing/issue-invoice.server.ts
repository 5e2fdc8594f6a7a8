import { and, desc, eq, sql } from "drizzle-orm"
import { invoiceLines, invoiceOrders, invoices, lots, orderEvents, orderLineLots, producerSettings } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { invoiceTotals } from "~/domain/invoicing/invoice-totals"
import { dueDates, termsWords } from "~/domain/invoicing/terms"
import { now } from "~/platform/clock.server"
import { env } from "~/platform/env.server"
import { queueMail } from "~/services/mail/queue-mail.server"
import { takeNumber } from "~/services/numbers/take-number.server"
import type { LockedOrder } from "~/services/orders/lock-order.server"
import { findStorePeople } from "~/services/orders/order-people.server"
import { recordChange } from "~/services/orders/record-change.server"
import { readInvoice } from "./read-invoice.server"

/**
 * Issues the invoice of an order in the transaction that sends it: the cases given at the price of the order, the
 * delivery fixed when it was placed, sales tax unless the store buys for resale. Mails it with its PDF to the store's
 * people. Answers the number as printed. The database refuses a second invoice of the same order.
 */
export async function issueInvoice(
	tx: Tx,
	query: { producer: { id: string; slug: string; timeZone: string }; order: LockedOrder; personId: string },
): Promise<string> {
	const { producer, order, personId } = query
	const { store } = order
	const issuedOn = dayInZone(now(), producer.timeZone)
	const [settings] = await tx
		.select({ taxBasisPoints: producerSettings.salesTaxBasisPoints })
		.from(producerSettings)
		.where(eq(producerSettings.producerId, producer.id))
	const lines = order.lines.map((line) => ({ ...line, sentCases: line.givenCases ?? 0 }))
	const isForResale = store.resaleCertificateUntil !== null && store.resaleCertificateUntil >= issuedOn
	const totals = invoiceTotals({
		lines: lines.map((line) => ({
			amountCents: line.sentCases * line.caseCents,
			isTaxable: line.product.isTaxable,
		})),
		deliveryCents: order.deliveryCents,
		isDeliveryTaxable: false,
		taxBasisPoints: settings?.taxBasisPoints ?? 0,
		isExempt: isForResale,
	})
	const terms = {
		kind: store.termsKind,
		days: store.termsDays,
		discountBasisPoints: store.termsDiscountBasisPoints,
		discountDays: store.termsDiscountDays,
	}
	const { dueOn, discountUntil } = dueDates(terms, issuedOn)
	const year = Number(issuedOn.slice(0, 4))
	const lotCodes = await findLotCodes(tx, { producerId: producer.id, lineIds: lines.map(({ id }) => id) })
	const shortNote = await findShortNote(tx, { producerId: producer.id, orderId: order.id })
	// Last of the locks, since every other invoice of the year waits for it.
	const sequence = await takeNumber(tx, { producerId: producer.id, series: "invoice", year })
	const [invoice] = await tx
		.insert(invoices)
		.values({
			producerId: producer.id,
			year,
			sequence,
			storeId: store.id,
			issuedOn,
			dueOn,
			discountUntil,
			discountBasisPoints: terms.discountBasisPoints,
			linesCents: totals.linesCents,
			deliveryCents: totals.deliveryCents,
			taxCents: totals.taxCents,
			totalCents: totals.totalCents,
			shortNote,
			termsWords: termsWords(terms),
			isForResale,
		})
		.returning({ id: invoices.id })
	if (!invoice) throw new Error("an insert returns its row")
	await tx.insert(invoiceOrders).values({ producerId: producer.id, orderId: order.id, invoiceId: invoice.id })
	await tx.insert(invoiceLines).values(
		lines.map((line, index) => ({
			producerId: producer.id,
			invoiceId: invoice.id,
			position: index + 1,
			orderId: order.id,
			orderLineId: line.id,
			productId: line.productId,
			code: line.product.code,
			name: line.product.name,
			detail: line.product.detail,
			lotCodes: lotCodes.get(line.id) ?? "",
			netGrams: line.sentCases * line.piecesPerCase * line.product.pieceNetGrams,
			askedCases: line.askedCases,
			sentCases: line.sentCases,
			caseCents: line.caseCents,
			lineCents: line.sentCases * line.caseCents,
			taxCents: totals.lineTaxCents[index] ?? 0,
		})),
	)
	const number = invoiceNumber(year, sequence)
	await recordChange(tx, {
		producerId: producer.id,
		orderId: order.id,
		kind: "invoiced",
		userId: personId,
		detail: { invoiceNumber: number },
	})
	await mailInvoice(tx, { producer, store, number })
	return number
}

async function mailInvoice(
	tx: Tx,
	query: { producer: { id: string; slug: string }; store: { id: string; slug: string }; number: string },
): Promise<void> {
	const { producer, store, number } = query
	const invoice = await readInvoice(tx, { producerId: producer.id, storeId: store.id, number })
	if (!invoice) throw new Error("the invoice has just been written")
	const page = `${env.BASE_URL}/buy/${producer.slug}/${store.slug}/invoices/${number}`
	for (const person of await findStorePeople(tx, {
		producerId: producer.id,
		storeId: store.id,
		kind: "invoices",
	})) {
		await queueMail(tx, {
			producerId: producer.id,
			to: person.email,
			onceKey: `invoice:${number}`,
			template: "invoice",
			props: { invoice: invoice.document, sentTo: person.email, payUrl: page, pdfUrl: `${page}.pdf` },
		})
	}
}

/** The codes of the lots that fill each line, by line id: "R09, R11". */
async function findLotCodes(
	tx: Tx,
	query: { producerId: string; lineIds: readonly string[] },
): Promise<Map<string, string>> {
	const rows = await tx
		.select({
			lineId: orderLineLots.orderLineId,
			codes: sql<string>`string_agg(${lots.code}, ', ' order by ${lots.bestBeforeOn}, ${lots.code})`,
		})
		.from(orderLineLots)
		.innerJoin(lots, and(eq(lots.producerId, orderLineLots.producerId), eq(lots.id, orderLineLots.lotId)))
		.where(
			and(
				eq(orderLineLots.producerId, query.producerId),
				sql`${orderLineLots.orderLineId} = any(${sql.param(query.lineIds)}::uuid[])`,
			),
		)
		.groupBy(orderLineLots.orderLineId)
	return new Map(rows.map(({ lineId, codes }) => [lineId, codes]))
}

/** What the store was told when the order was confirmed, for the foot of the invoice; empty where nothing was short. */
async function findShortNote(tx: Tx, query: { producerId: string; orderId: string }): Promise<string> {
	const [event] = await tx
		.select({ detail: orderEvents.detail })
		.from(orderEvents)
		.where(
			and(
				eq(orderEvents.producerId, query.producerId),
				eq(orderEvents.orderId, query.orderId),
				eq(orderEvents.kind, "confirmed"),
			),
		)
		.orderBy(desc(orderEvents.at))
		.limit(1)
	return typeof event?.detail.shortNote === "string" ? event.detail.shortNote : ""
}
