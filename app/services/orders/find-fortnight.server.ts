import { readProducer } from "~/db/transaction.server"
import { addDays, type Day, daysBetween, fortnight } from "~/domain/calendar"
import {
	type DeliverySchedule,
	deliveryDaysOf,
	findDeliverySchedule,
	type OpenOrClosedDay,
} from "~/services/delivery/find-delivery-days.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { findOutlooks, type ProductOutlook } from "~/services/promise/find-outlooks.server"
import { caseStrips } from "./cases-on-day.server"
import { findOwnLines, type OwnLine } from "./find-asked-days.server"

/** One of the fourteen days of a store's ribbon; figures are whole cases over all products it may buy. */
export type FortnightDay = {
	on: Day
	delivery: OpenOrClosedDay | null
	/** What can still be promised for the day. */
	freeCases: number
	/** What the store has asked for, or been given. */
	ownCases: number
}

/** The first day of the ribbon that shows `day`: ribbons follow one another from today on, a fortnight each. */
export function ribbonStart(today: Day, day: Day): Day {
	return addDays(today, 14 * Math.floor(daysBetween(today, day) / 14))
}

/** Puts together the ribbon from what has been read; reads nothing itself. */
export function fortnightOf(facts: {
	schedule: DeliverySchedule
	from: Day
	outlooks: readonly ProductOutlook[]
	ownLines: readonly OwnLine[]
}): FortnightDay[] {
	const { schedule, from, outlooks, ownLines } = facts
	const days = fortnight(from)
	const deliveries = new Map(
		deliveryDaysOf(schedule, 14, from).flatMap((day) => (days.includes(day.on) ? [[day.on, day] as const] : [])),
	)
	const open = [...deliveries.values()].filter((day) => day.isOpen).map((day) => day.on)
	const free = new Map(open.map((on) => [on, 0]))
	for (const outlook of outlooks) {
		for (const [index, strip] of caseStrips(outlook, open).entries()) {
			const on = open[index] as Day
			free.set(on, (free.get(on) ?? 0) + strip.freeCases)
		}
	}
	return days.map((on) => ({
		on,
		delivery: deliveries.get(on) ?? null,
		freeCases: free.get(on) ?? 0,
		ownCases: ownLines.filter((line) => line.deliveryOn === on).reduce((sum, line) => sum + line.cases, 0),
	}))
}

/** The ribbon of a store, for a page that reads nothing else of it: the fortnight that shows `day`, or today's. */
export function findFortnight(query: {
	producerId: string
	storeId: string
	now: Date
	zone: string
	day?: Day
}): Promise<FortnightDay[]> {
	const { producerId, storeId } = query
	return readProducer(producerId, async (tx) => {
		const schedule = await findDeliverySchedule(tx, query)
		const from = ribbonStart(schedule.today, query.day ?? schedule.today)
		const products = await findStorePrices(tx, { producerId, storeId, today: schedule.today })
		const productIds = products.map((product) => product.productId)
		const outlooks = await findOutlooks(tx, { producerId, today: schedule.today, productIds })
		const ownLines = await findOwnLines(tx, { producerId, storeId, from, to: addDays(from, 13), lastBefore: from })
		return fortnightOf({ schedule, from, outlooks: [...outlooks.values()], ownLines })
	})
}
