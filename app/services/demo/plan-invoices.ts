import type { invoiceLines, invoiceOrders, invoices } from "~/db/schema"
import { dueDates, type Terms, termsWords } from "~/domain/invoicing/terms"
import { shortSentence } from "~/domain/orders/short-sentence"
import { labelledGrams } from "~/domain/weight"
import type { OrderOfSeason } from "./plan-orders"
import type { Season } from "./season"

export type InvoiceRow = typeof invoices.$inferInsert & { id: string }

export type Invoices = {
	/** In the order of their numbers. */
	invoices: { row: InvoiceRow; order: OrderOfSeason }[]
	lines: (typeof invoiceLines.$inferInsert)[]
	orders: (typeof invoiceOrders.$inferInsert)[]
}

/** One invoice for each order that was sent, numbered without gaps within its year, as nothing has been paid yet. */
export function planInvoices({ producerId, chance }: Season, orders: readonly OrderOfSeason[]): Invoices {
	const plan: Invoices = { invoices: [], lines: [], orders: [] }
	const lastOfYear = new Map<number, number>()
	const sent = orders.flatMap((order) => (order.sentAt ? { order, sentAt: order.sentAt } : []))
	for (const { order, sentAt } of sent.toSorted((a, b) => a.sentAt.getTime() - b.sentAt.getTime())) {
		const id = chance.id()
		const year = Number(order.on.slice(0, 4))
		const sequence = (lastOfYear.get(year) ?? 0) + 1
		lastOfYear.set(year, sequence)
		const lines = order.lines.map((line, position) =>
			invoiceLine(line, { producerId, id: chance.id(), invoiceId: id, orderId: order.id, position }),
		)
		plan.orders.push({ producerId, orderId: order.id, invoiceId: id })
		plan.lines.push(...lines)
		const linesCents = lines.reduce((sum, line) => sum + line.lineCents, 0)
		const dates = dueDates(termsOf(order), order.on)
		plan.invoices.push({
			order,
			row: {
				producerId,
				id,
				year,
				sequence,
				storeId: order.store.id,
				issuedOn: order.on,
				dueOn: dates.dueOn,
				discountUntil: dates.discountUntil,
				discountBasisPoints: termsOf(order).discountBasisPoints,
				poNumbers: order.poNumber,
				termsWords: termsWords(termsOf(order)),
				isForResale: order.store.hasCertificate,
				linesCents,
				deliveryCents: order.deliveryCents,
				taxCents: 0,
				totalCents: linesCents + order.deliveryCents,
				shortNote: shortNote(order),
				createdAt: sentAt,
			},
		})
	}
	return plan
}

function termsOf({ store }: OrderOfSeason): Terms {
	return {
		kind: store.termsKind,
		days: store.termsDays,
		discountBasisPoints: store.discount?.basisPoints ?? 0,
		discountDays: store.discount?.days ?? 0,
	}
}

function invoiceLine(
	line: OrderOfSeason["lines"][number],
	keys: { producerId: string; id: string; invoiceId: string; orderId: string; position: number },
) {
	const { product, asked, given, caseCents } = line
	const sentCases = given ?? 0
	return {
		...keys,
		position: keys.position + 1,
		orderLineId: line.id,
		productId: product.id,
		code: product.code,
		name: product.name,
		detail: `${product.detail}, case of ${product.piecesPerCase}`,
		lotCodes: line.lots.map((lot) => lot.code).join(", "),
		netGrams: labelledGrams(product.netOunces) * sentCases * product.piecesPerCase,
		askedCases: asked,
		sentCases,
		caseCents,
		lineCents: sentCases * caseCents,
	}
}

function shortNote(order: OrderOfSeason): string {
	return order.lines
		.flatMap(({ product, asked, given }) =>
			given !== null && given < asked
				? shortSentence({ productName: product.name, asked, given, deliveryOn: order.on, keepsPrice: true })
				: [],
		)
		.join(" ")
}
