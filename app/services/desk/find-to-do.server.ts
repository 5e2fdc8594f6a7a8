import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { type Day, dayInZone } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { wholeCases } from "~/domain/quantity"
import { findOpenReports, type OpenReport } from "~/services/breakage/find-open-reports.server"
import { deliveryDayOn, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { mostCases, promiseDay, promisedCases } from "~/services/orders/find-most-cases.server"
import { findOutlooks, type ProductOutlook } from "~/services/promise/find-outlooks.server"
import { readToLookAt, type ToLookAt } from "~/services/receivables/find-to-look-at.server"
import { findOpenOrders, type OpenOrder } from "./find-open-orders.server"
import { findSettledToday, type SettledToday } from "./find-settled-today.server"
import { findShortages, type Shortage } from "./shortages.server"

/**
 * An order that waits to be confirmed; `isWhole` when all that it asks, or what sharing out has given it, can be given
 * beside all others so marked.
 */
export type WaitingOrder = { order: OpenOrder; isWhole: boolean }

/** Orders of one delivery day that wait to be confirmed, and when its last orders are. */
export type WaitingDay = { deliveryOn: Day; cutoffAt: Date | null; orders: WaitingOrder[] }

/** A delivery day with orders to pack or to send off; cases given. */
export type PackingDay = {
	deliveryOn: Day
	orders: number
	packedOrders: number
	cases: number
	packedCases: number
}

export type HeldLot = { code: string; productName: string; cases: number; pieces: number; expectedReleaseOn: Day }

export type OverdueInvoice = { number: string; storeName: string; dueOn: Day; openCents: number }

export type ToDo = {
	waiting: WaitingDay[]
	packing: PackingDay[]
	heldLots: HeldLot[]
	shortages: Shortage[]
	/** Broken comb that stores have reported, and certificates and promises to look at. */
	reports: OpenReport[]
	toLookAt: ToLookAt[]
	/** Payments that stand otherwise here than at Stripe. */
	differences: number
	overdue: OverdueInvoice[]
	settled: SettledToday
}

/** All that is to settle at the desk, at one moment; each list by the day it is about. */
export function findToDo(query: { producerId: string; now: Date; zone: string }): Promise<ToDo> {
	const { producerId, now, zone } = query
	const today = dayInZone(now, zone)
	return readProducer(producerId, async (tx) => {
		const schedule = await findDeliverySchedule(tx, { producerId, storeId: null, now, zone })
		const orders = await findOpenOrders(tx, { producerId, states: ["placed", "confirmed", "packed"] })
		const outlooks = await findOutlooks(tx, { producerId, today })
		const waiting = findWaiting({ orders, outlooks, today })
		const days = [...new Set(waiting.map(({ order }) => order.deliveryOn))]
		return {
			waiting: days.map((deliveryOn) => ({
				deliveryOn,
				cutoffAt: deliveryDayOn(schedule, deliveryOn)?.cutoffAt ?? null,
				orders: waiting.filter(({ order }) => order.deliveryOn === deliveryOn),
			})),
			packing: packingDays(orders),
			heldLots: await findHeldLots(tx, producerId),
			shortages: findShortages({ orders, outlooks, today }),
			reports: await findOpenReports(tx, { producerId }),
			toLookAt: await readToLookAt(tx, { producerId, today }),
			differences: await countDifferences(tx, producerId),
			overdue: await findOverdue(tx, { producerId, today }),
			settled: await findSettledToday(tx, { producerId, now, zone }),
		}
	})
}

/** The orders placed, in turn: what one that is whole takes of a product to be shared out is gone for the next. */
function findWaiting(facts: {
	orders: readonly OpenOrder[]
	outlooks: ReadonlyMap<string, ProductOutlook>
	today: Day
}): WaitingOrder[] {
	const { today } = facts
	// One sum for each day keeps this quick with thousands of orders.
	const outlooks = new Map(
		[...facts.outlooks].map(([id, one]) => [id, { ...one, promises: one.promises.map((promise) => ({ ...promise })) }]),
	)
	return facts.orders
		.filter((order) => order.state === "placed")
		.map((order) => {
			const { deliveryOn, lines } = order
			const isWhole =
				lines.some((line) => settledCases(line) > 0) &&
				lines.every(
					(line) => mostCases(outlooks.get(line.productId), { line, deliveryOn, today }) >= settledCases(line),
				)
			for (const line of isWhole ? lines : []) {
				const quantity = (settledCases(line) - promisedCases(line)) * line.piecesPerCase
				const promises = outlooks.get(line.productId)?.promises
				const on = promiseDay(deliveryOn, today)
				const ofDay = promises?.find((promise) => promise.on === on)
				if (ofDay) ofDay.quantity += quantity
				else promises?.push({ on, quantity })
			}
			return { order, isWhole }
		})
}

/** What a line gets when its order is confirmed whole: all that it asks, or what sharing out has given it. */
const settledCases = (line: OpenOrder["lines"][number]) => line.givenCases ?? line.askedCases

/** What is to pack and to send off, by delivery day. Reads nothing. */
function packingDays(orders: readonly OpenOrder[]): PackingDay[] {
	const days = new Map<Day, PackingDay>()
	for (const { state, deliveryOn, lines } of orders) {
		if (state === "placed") continue
		const cases = lines.reduce((sum, line) => sum + (line.givenCases ?? 0), 0)
		const day = days.get(deliveryOn) ?? { deliveryOn, orders: 0, packedOrders: 0, cases: 0, packedCases: 0 }
		const packed = state === "packed" ? 1 : 0
		days.set(deliveryOn, {
			deliveryOn,
			orders: day.orders + 1,
			packedOrders: day.packedOrders + packed,
			cases: day.cases + cases,
			packedCases: day.packedCases + packed * cases,
		})
	}
	return [...days.values()]
}

/** What is to pack, for those who see nothing else of the desk. */
export function findPackingDays(query: { producerId: string }): Promise<PackingDay[]> {
	return readProducer(query.producerId, async (tx) =>
		packingDays(await findOpenOrders(tx, { producerId: query.producerId, states: ["confirmed", "packed"] })),
	)
}

async function findHeldLots(tx: Tx, producerId: string): Promise<HeldLot[]> {
	const { rows } = await tx.execute<Omit<HeldLot, "cases"> & { piecesPerCase: number }>(sql`
		select l.code, p.name as "productName", p.pieces_per_case as "piecesPerCase",
			l.expected_release_on::text as "expectedReleaseOn", sum(b.pieces)::int as pieces
		from lots l
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
		where l.producer_id = ${producerId} and l.state = 'held' and b.place in ('cold-room', 'ready') and b.pieces > 0
		group by l.code, p.name, p.pieces_per_case, l.expected_release_on
		order by l.expected_release_on, l.code`)
	return rows.map(({ piecesPerCase, ...lot }) => ({ ...lot, cases: wholeCases(lot.pieces, piecesPerCase) }))
}

async function countDifferences(tx: Tx, producerId: string): Promise<number> {
	const { rows } = await tx.execute<{ count: number }>(sql`
		select count(*)::int as count from stripe_differences d
		where d.producer_id = ${producerId} and d.settled_at is null`)
	return rows[0]?.count ?? 0
}

async function findOverdue(tx: Tx, query: { producerId: string; today: Day }): Promise<OverdueInvoice[]> {
	const { rows } = await tx.execute<Omit<OverdueInvoice, "number"> & { year: number; sequence: number }>(sql`
		select i.year, i.sequence, s.name as "storeName", i.due_on::text as "dueOn",
			i.open_cents as "openCents"
		from invoices i
		join stores s on s.producer_id = i.producer_id and s.id = i.store_id
		where i.producer_id = ${query.producerId} and i.open_cents > 0 and i.due_on < ${query.today}
		order by i.due_on, i.year, i.sequence
		limit 20`)
	return rows.map(({ year, sequence, ...invoice }) => ({ ...invoice, number: invoiceNumber(year, sequence) }))
}
