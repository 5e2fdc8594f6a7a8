import { and, eq } from "drizzle-orm"
import { stores } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"
import type { OrderState } from "~/domain/orders/order-states"
import type { DeliveryTerms } from "~/domain/pricing/price-order"
import { canServe } from "~/domain/promise/free-to-promise"
import {
	deliveryDayOn,
	deliveryDaysOf,
	findDeliverySchedule,
	type OpenOrClosedDay,
} from "~/services/delivery/find-delivery-days.server"
import { findStorePrices, type StoreProduct } from "~/services/pricing/find-store-prices.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { readStoreCredit } from "~/services/receivables/read-credit.server"
import { type CaseStrip, caseStrips } from "./cases-on-day.server"
import { setFree } from "./check-asked.server"
import { findCasesToShare, findOwnLines, type OwnLine } from "./find-asked-days.server"
import { findDraft, type OrderDraft } from "./find-draft.server"
import { type FortnightDay, fortnightOf, ribbonStart } from "./find-fortnight.server"
import { findNamedOrder, findUsualCases, type NamedOrder } from "./find-order-habits.server"

/** A row of the sheet; all figures in cases. */
export type SheetRow = StoreProduct & {
	strip: CaseStrip
	/** What all stores together have asked for that day and is still to be shared out. */
	toShareCases: number
	/** What the store had on its last delivery before this day, and the median of its last few orders with it. */
	lastCases: number
	usualCases: number
	/** What it has already ordered for this day. */
	orderedCases: number
	/** Whether there is any supply by that day, so that asking, if only to be shared out, is of use. */
	mayAsk: boolean
}

export type OrderSheet = {
	day: OpenOrClosedDay
	fortnight: FortnightDay[]
	store: {
		address: string
		receivingNote: string
		terms: DeliveryTerms
		/** The producer looks at its orders before promising anything: it is stopped, or owes more than its limit. */
		isLookedAtFirst: boolean
	}
	rows: SheetRow[]
	/** The store's orders for this day, the earliest first. */
	orders: { number: number; state: OrderState; cases: number }[]
	/** The order that is being changed, or ordered again, where one is named. */
	named: NamedOrder | null
	/** What was begun for this day and not sent yet. */
	draft: OrderDraft | null
}

type SheetQuery = {
	producerId: string
	storeId: string
	now: Date
	zone: string
	day: Day
	/** An order of the store to start from: its own promises are free to it while it is changed. */
	named?: { number: number; isChange: boolean }
}

/**
 * Everything the order sheet of one store and day shows, read at one moment in nine statements, ten with a named order. Null when the van does
 * not come to the store that day; a day whose orders have closed is answered, and says so.
 */
export function findOrderSheet(query: SheetQuery): Promise<OrderSheet | null> {
	return readProducer(query.producerId, (tx) => readSheet(tx, query))
}

async function readSheet(tx: Tx, query: SheetQuery): Promise<OrderSheet | null> {
	const { producerId, storeId } = query
	const schedule = await findDeliverySchedule(tx, query)
	const { today } = schedule
	const day = deliveryDayOn(schedule, query.day)
	if (!day) return null
	const store = await findStoreTerms(tx, { producerId, storeId })
	const products = await findStorePrices(tx, { producerId, storeId, today })
	const productIds = products.map((product) => product.productId)
	const outlooks = await findOutlooks(tx, { producerId, today, productIds })
	const named = query.named ? await findNamedOrder(tx, { producerId, storeId, number: query.named.number }) : null
	const isChange = query.named?.isChange === true
	if (isChange && named?.deliveryOn === day.on) setFree(outlooks, day.on, named.lines)
	const usual = await findUsualCases(tx, { producerId, storeId, before: day.on })
	const from = ribbonStart(today, day.on)
	const ownLines = await findOwnLines(tx, { producerId, storeId, from, to: addDays(from, 13), lastBefore: day.on })
	const toShare = await findCasesToShare(tx, { producerId, deliveryOn: day.on })

	const lastOn = ownLines.findLast((line) => line.deliveryOn < day.on)?.deliveryOn
	return {
		day,
		fortnight: fortnightOf({ schedule, from, outlooks: [...outlooks.values()], ownLines }),
		store,
		rows: products.flatMap((product) => {
			const outlook = outlooks.get(product.productId)
			const [strip] = outlook ? caseStrips(outlook, [day.on]) : []
			if (!outlook || !strip) return []
			return {
				...product,
				strip,
				toShareCases: toShare.get(product.productId) ?? 0,
				lastCases: casesOn(ownLines, lastOn, product.productId),
				usualCases: usual.get(product.productId) ?? 0,
				orderedCases: casesOn(ownLines, day.on, product.productId),
				mayAsk: outlook.supplies.some((supply) => supply.quantity > 0 && canServe(supply, day.on)),
			}
		}),
		orders: ordersOn(ownLines, day.on),
		named,
		draft: isChange ? null : await findDraft(tx, { producerId, storeId, deliveryOn: day.on }),
	}
}

/** The first delivery day that still takes the store's orders, on or after `from` where given; null when there is none. */
export function findNextOpenDay(query: Omit<SheetQuery, "day"> & { from?: Day }): Promise<Day | null> {
	return readProducer(query.producerId, async (tx) => {
		const schedule = await findDeliverySchedule(tx, query)
		const from = query.from && query.from > schedule.today ? query.from : schedule.today
		// Cut-offs lie at most a fortnight ahead, so a day that takes orders is among the next fifteen.
		return deliveryDaysOf(schedule, 15, from).find((day) => day.isOpen)?.on ?? null
	})
}

async function findStoreTerms(tx: Tx, query: { producerId: string; storeId: string }): Promise<OrderSheet["store"]> {
	const [store] = await tx
		.select({
			address: stores.address,
			receivingNote: stores.receivingNote,
			minimumCents: stores.minimumCents,
			deliveryChargeCents: stores.deliveryChargeCents,
			freeAboveCents: stores.freeAboveCents,
			isStopped: stores.isStopped,
			creditLimitCents: stores.creditLimitCents,
		})
		.from(stores)
		.where(and(eq(stores.producerId, query.producerId), eq(stores.id, query.storeId)))
	if (!store) throw new Error("a sheet is for a store that is there")
	const { address, receivingNote, isStopped, creditLimitCents, ...terms } = store
	const isLookedAtFirst = isStopped || (creditLimitCents !== null && (await readStoreCredit(tx, query)) !== null)
	return { address, receivingNote, terms, isLookedAtFirst }
}

function casesOn(lines: readonly OwnLine[], on: Day | undefined, productId: string): number {
	return lines
		.filter((line) => line.deliveryOn === on && line.productId === productId)
		.reduce((sum, line) => sum + line.cases, 0)
}

function ordersOn(lines: readonly OwnLine[], on: Day): OrderSheet["orders"] {
	const orders = new Map<number, OrderSheet["orders"][number]>()
	for (const { number, state, cases } of lines.filter((line) => line.deliveryOn === on)) {
		orders.set(number, { number, state, cases: (orders.get(number)?.cases ?? 0) + cases })
	}
	return [...orders.values()]
}
