import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { deliveryDaysOf, findDeliverySchedule } from "~/services/delivery/find-delivery-days.server"
import { findOutlooks } from "~/services/promise/find-outlooks.server"
import { caseStrips } from "./cases-on-day.server"

/** So many delivery days are looked through for another day. */
const DAYS_AHEAD = 12

/**
 * For each product, the first three delivery days that still take the store's orders and have as many cases free as are
 * asked, `except` left out. A product of which no day has so many has no days.
 */
export function findDaysWithCases(query: {
	producerId: string
	storeId: string
	now: Date
	zone: string
	except: Day
	asked: readonly { productId: string; cases: number }[]
}): Promise<Map<string, Day[]>> {
	const { producerId, asked } = query
	return readProducer(producerId, async (tx) => {
		const schedule = await findDeliverySchedule(tx, query)
		const open = deliveryDaysOf(schedule, DAYS_AHEAD, schedule.today)
			.filter((day) => day.isOpen && day.on !== query.except)
			.map((day) => day.on)
		const productIds = asked.map((line) => line.productId)
		const outlooks = await findOutlooks(tx, { producerId, today: schedule.today, productIds })
		return new Map(
			asked.map(({ productId, cases }) => {
				const outlook = outlooks.get(productId)
				const strips = outlook ? caseStrips(outlook, open) : []
				return [productId, open.filter((_, index) => (strips[index]?.freeCases ?? 0) >= cases).slice(0, 3)]
			}),
		)
	})
}
