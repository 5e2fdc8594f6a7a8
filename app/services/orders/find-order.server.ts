import { and, asc, eq } from "drizzle-orm"
import { invoiceOrders, invoices, orderEvents, orderLines, orders, products, users } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { isOpenToChange, type OrderState } from "~/domain/orders/order-states"
import { deliveryDayOn, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"

/** A line as it was placed: the price is the one applied then. `givenCases` is null until the producer has decided. */
export type OrderLine = {
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
	pieceNetGrams: number
}

export type OrderEvent = { kind: (typeof orderEvents.$inferSelect)["kind"]; at: Date; who: string | null }

/** An order as its store sees it. */
export type StoreOrder = {
	number: number
	state: OrderState
	deliveryOn: Day
	/** Last orders for that day; null when the van no longer comes on such days. */
	cutoffAt: Date | null
	mayCancel: boolean
	isStanding: boolean
	poNumber: string
	note: string
	deliveryCents: number
	lines: OrderLine[]
	events: OrderEvent[]
	invoice: { year: number; sequence: number } | null
}

/** The store's order of that number with its lines by code and its timeline, the earliest first; null when it has none. */
export function findOrder(query: {
	producerId: string
	storeId: string
	number: number
	now: Date
	zone: string
}): Promise<StoreOrder | null> {
	const { producerId, storeId, number, now } = query
	return readProducer(producerId, async (tx) => {
		const [order] = await tx
			.select()
			.from(orders)
			.where(and(eq(orders.producerId, producerId), eq(orders.storeId, storeId), eq(orders.number, number)))
		if (!order) return null
		const lines = await tx
			.select({
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
				pieceNetGrams: products.pieceNetGrams,
			})
			.from(orderLines)
			.innerJoin(products, and(eq(products.producerId, orderLines.producerId), eq(products.id, orderLines.productId)))
			.where(and(eq(orderLines.producerId, producerId), eq(orderLines.orderId, order.id)))
			.orderBy(asc(products.code))
		const events = await tx
			.select({ kind: orderEvents.kind, at: orderEvents.at, who: users.name })
			.from(orderEvents)
			.leftJoin(users, eq(users.id, orderEvents.userId))
			.where(and(eq(orderEvents.producerId, producerId), eq(orderEvents.orderId, order.id)))
			.orderBy(asc(orderEvents.at))
		const [invoice] = await tx
			.select({ year: invoices.year, sequence: invoices.sequence })
			.from(invoiceOrders)
			.innerJoin(
				invoices,
				and(eq(invoices.producerId, invoiceOrders.producerId), eq(invoices.id, invoiceOrders.invoiceId)),
			)
			.where(and(eq(invoiceOrders.producerId, producerId), eq(invoiceOrders.orderId, order.id)))
		const day = deliveryDayOn(await findDeliverySchedule(tx, query), order.deliveryOn)
		return {
			number: order.number,
			state: order.state,
			deliveryOn: order.deliveryOn,
			cutoffAt: day?.cutoffAt ?? null,
			mayCancel: day !== null && isOpenToChange(order.state, day.cutoffAt, now),
			isStanding: order.standingOrderId !== null,
			poNumber: order.poNumber,
			note: order.note,
			deliveryCents: order.deliveryCents,
			lines,
			events,
			invoice: invoice ?? null,
		}
	})
}
