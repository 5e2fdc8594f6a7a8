import type { Day } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { undoConfirmation } from "~/services/orders/undo-confirmation.server"
import { findToDo } from "./find-to-do.server"

/** So many orders are confirmed by one press: more would keep the page waiting for longer than a reader does. */
const MOST_AT_ONCE = 100

type Desk = { producer: { id: string; slug: string; timeZone: string }; personId: string }

/**
 * Confirms the orders of a day that can be met in full, one after the other, each in a transaction of its own: one that
 * can no longer be met is left. A hundred at most, the earliest first. Answers how many were confirmed, how many of the day
 * are left, and how many of those could not be reached this time.
 */
export async function confirmWhole(query: Desk & { day: Day }): Promise<{
	confirmed: number
	left: number
	more: number
}> {
	const { producer, personId, day } = query
	const { waiting } = await findToDo({ producerId: producer.id, now: now(), zone: producer.timeZone })
	const orders = waiting.find(({ deliveryOn }) => deliveryOn === day)?.orders ?? []
	const whole = orders.filter(({ isWhole }) => isWhole)
	let confirmed = 0
	for (const { order } of whole.slice(0, MOST_AT_ONCE)) {
		const answer = await confirmOrder({ producer, number: order.number, personId, given: [] })
		if (answer.ok) confirmed += 1
	}
	return { confirmed, left: orders.length - confirmed, more: Math.max(0, whole.length - MOST_AT_ONCE) }
}

/**
 * Takes back all confirmations whose letters have not gone, one after the other and a hundred at most; one whose letter
 * goes meanwhile stays. Answers how many were taken back.
 */
export async function undoWhole({ producer, personId }: Desk): Promise<number> {
	const { settled } = await findToDo({ producerId: producer.id, now: now(), zone: producer.timeZone })
	let undone = 0
	for (const { number } of settled.undoable.slice(0, MOST_AT_ONCE)) {
		const answer = await undoConfirmation({ producer, number, personId })
		if (answer.ok) undone += 1
	}
	return undone
}
