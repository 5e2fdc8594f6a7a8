import { and, asc, eq, sql } from "drizzle-orm"
import {
	invoiceOrders,
	invoices,
	lots,
	orderEvents,
	orderLineLots,
	orderLines,
	orders,
	outboxMails,
	products,
	stores,
	users,
} from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import type { OrderState } from "~/domain/orders/order-states"
import { confirmationKey } from "./confirm-order.server"
import { findMostCases } from "./find-most-cases.server"

export type DeskOrderLine = {
	id: string
	code: string
	name: string
	detail: string
	askedCases: number
	givenCases: number | null
	isToShare: boolean
	/** Of a line to be shared out: the cases that are sure already. */
	promisedCases: number
	caseCents: number
	/** Set where it is priced by weight: `caseCents` is an estimate until `weighedGrams` is there. */
	poundCents: number | null
	weighedGrams: number | null
	piecesPerCase: number
	/** The most that can be given now; all that was given once it is decided. */
	mostCases: number
	/** Which pieces of which lot fill it, once packed. */
	lots: { code: string; pieces: number }[]
}

/** An order as the desk sees it. */
export type DeskOrder = {
	number: number
	state: OrderState
	deliveryOn: Day
	storeName: string
	storeAddress: string
	receivingNote: string
	isStanding: boolean
	poNumber: string
	note: string
	deliveryCents: number
	lines: DeskOrderLine[]
	events: { kind: (typeof orderEvents.$inferSelect)["kind"]; at: Date; who: string | null; isUndone: boolean }[]
	invoiceNumber: string | null
	/** Whether the confirmation can be taken back: none of its letters has gone. */
	canUndo: boolean
	/** Who is told at the store, by name. */
	lettersTo: string[]
}

/** The producer's order of that number with its lines by code and its timeline, the earliest first; null without one. */
export function findDeskOrder(query: {
	producerId: string
	number: number
	now: Date
	zone: string
}): Promise<DeskOrder | null> {
	const { producerId, number } = query
	return readProducer(producerId, async (tx) => {
		const [found] = await tx
			.select({ order: orders, store: stores })
			.from(orders)
			.innerJoin(stores, and(eq(stores.producerId, orders.producerId), eq(stores.id, orders.storeId)))
			.where(and(eq(orders.producerId, producerId), eq(orders.number, number)))
		if (!found) return null
		const { order, store } = found
		const [invoice] = await tx
			.select({ year: invoices.year, sequence: invoices.sequence })
			.from(invoiceOrders)
			.innerJoin(
				invoices,
				and(eq(invoices.producerId, invoiceOrders.producerId), eq(invoices.id, invoiceOrders.invoiceId)),
			)
			.where(and(eq(invoiceOrders.producerId, producerId), eq(invoiceOrders.orderId, order.id)))
		const letters = await tx
			.select({ sentAt: outboxMails.sentAt, recipient: outboxMails.recipient })
			.from(outboxMails)
			.where(and(eq(outboxMails.producerId, producerId), eq(outboxMails.onceKey, confirmationKey(order.id))))
			.orderBy(asc(outboxMails.recipient))
		return {
			number: order.number,
			state: order.state,
			deliveryOn: order.deliveryOn,
			storeName: store.name,
			storeAddress: store.address,
			receivingNote: store.receivingNote,
			isStanding: order.standingOrderId !== null,
			poNumber: order.poNumber,
			note: order.note,
			deliveryCents: order.deliveryCents,
			lines: await findLines(tx, { ...query, orderId: order.id, deliveryOn: order.deliveryOn, state: order.state }),
			events: await findEvents(tx, { producerId, orderId: order.id }),
			invoiceNumber: invoice ? invoiceNumber(invoice.year, invoice.sequence) : null,
			canUndo: order.state === "confirmed" && letters.every(({ sentAt }) => sentAt === null),
			lettersTo: letters.map(({ recipient }) => recipient),
		}
	})
}

async function findLines(
	tx: Tx,
	query: { producerId: string; orderId: string; deliveryOn: Day; state: OrderState; now: Date; zone: string },
): Promise<DeskOrderLine[]> {
	const { producerId, orderId, deliveryOn } = query
	const lines = await tx
		.select({
			id: orderLines.id,
			productId: orderLines.productId,
			code: products.code,
			name: products.name,
			detail: products.detail,
			askedCases: orderLines.askedCases,
			givenCases: orderLines.givenCases,
			isToShare: orderLines.isToShare,
			promisedCases: orderLines.promisedCases,
			caseCents: orderLines.caseCents,
			poundCents: orderLines.poundCents,
			weighedGrams: orderLines.weighedGrams,
			piecesPerCase: orderLines.piecesPerCase,
		})
		.from(orderLines)
		.innerJoin(products, and(eq(products.producerId, orderLines.producerId), eq(products.id, orderLines.productId)))
		.where(and(eq(orderLines.producerId, producerId), eq(orderLines.orderId, orderId)))
		.orderBy(sql`length(${products.code})`, asc(products.code))
	const filled = await tx
		.select({ lineId: orderLineLots.orderLineId, code: lots.code, pieces: orderLineLots.pieces })
		.from(orderLineLots)
		.innerJoin(lots, and(eq(lots.producerId, orderLineLots.producerId), eq(lots.id, orderLineLots.lotId)))
		.innerJoin(
			orderLines,
			and(eq(orderLines.producerId, orderLineLots.producerId), eq(orderLines.id, orderLineLots.orderLineId)),
		)
		.where(and(eq(orderLineLots.producerId, producerId), eq(orderLines.orderId, orderId)))
		.orderBy(asc(lots.bestBeforeOn), asc(lots.code))
	const today = dayInZone(query.now, query.zone)
	const most =
		query.state === "placed"
			? await findMostCases(tx, { producerId, deliveryOn, today, lines })
			: new Map<string, number>()
	return lines.map(({ productId: _, ...line }) => ({
		...line,
		mostCases: most.get(line.id) ?? line.givenCases ?? 0,
		lots: filled.filter(({ lineId }) => lineId === line.id).map(({ code, pieces }) => ({ code, pieces })),
	}))
}

async function findEvents(tx: Tx, query: { producerId: string; orderId: string }): Promise<DeskOrder["events"]> {
	const events = await tx
		.select({ kind: orderEvents.kind, at: orderEvents.at, who: users.name, detail: orderEvents.detail })
		.from(orderEvents)
		.leftJoin(users, eq(users.id, orderEvents.userId))
		.where(and(eq(orderEvents.producerId, query.producerId), eq(orderEvents.orderId, query.orderId)))
		.orderBy(asc(orderEvents.at), asc(orderEvents.id))
	return events.map(({ detail, ...event }) => ({ ...event, isUndone: detail.undone === "confirmation" }))
}
