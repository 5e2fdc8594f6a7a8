import type { Day } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { findToDo } from "./find-to-do.server"

/**
 * Confirms all orders of a day that can be met in full, one after the other, each in a transaction of its own: one that
 * can no longer be met is left. Answers how many were confirmed and how many were left.
 */
export async function confirmWhole(query: {
	producer: { id: string; slug: string; timeZone: string }
	personId: string
	day: Day
}): Promise<{ confirmed: number; left: number }> {
	const { producer, personId, day } = query
	const { waiting } = await findToDo({ producerId: producer.id, now: now(), zone: producer.timeZone })
	const orders = waiting.find(({ deliveryOn }) => deliveryOn === day)?.orders ?? []
	let confirmed = 0
	for (const { order, isWhole } of orders) {
		if (!isWhole) continue
		const answer = await confirmOrder({ producer, number: order.number, personId, given: [] })
		if (answer.ok) confirmed += 1
	}
	return { confirmed, left: orders.length - confirmed }
}
