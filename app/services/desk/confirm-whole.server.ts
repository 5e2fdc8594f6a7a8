import type { Day } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { confirmOrder } from "~/services/orders/confirm-order.server"
import { undoConfirmation } from "~/services/orders/undo-confirmation.server"
import { findToDo } from "./find-to-do.server"

/** One press works for so long at most: a page that waits for longer is given up by what stands before it. */
const MOST_MILLISECONDS = 30_000

type Desk = { producer: { id: string; slug: string; timeZone: string }; personId: string }

/**
 * Confirms the orders of a day that can be met in full, one after the other, each in a transaction of its own: one that
 * can no longer be met is left, and one that another hand has confirmed meanwhile is passed over. The earliest first, until
 * all are or half a minute is over; what was confirmed by then stays. Answers how many were confirmed, how many of the day
 * are left, and how many of those were not reached this time.
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
	const { done, reached } = await oneByOne(whole, ({ order }) =>
		confirmOrder({ producer, number: order.number, personId, given: [] }),
	)
	return { confirmed: done, left: orders.length - done, more: whole.length - reached }
}

/**
 * Takes back all confirmations whose letters have not gone, one after the other and for half a minute at most; one whose
 * letter goes meanwhile stays. Answers how many were taken back.
 */
export async function undoWhole({ producer, personId }: Desk): Promise<number> {
	const { settled } = await findToDo({ producerId: producer.id, now: now(), zone: producer.timeZone })
	const { done } = await oneByOne(settled.undoable, ({ number }) => undoConfirmation({ producer, number, personId }))
	return done
}

/** Takes a step for each until the time is over; answers how many were reached, and for how many it was done. */
async function oneByOne<One>(
	all: readonly One[],
	step: (one: One) => Promise<{ ok: boolean }>,
): Promise<{ done: number; reached: number }> {
	const until = performance.now() + MOST_MILLISECONDS
	let [done, reached] = [0, 0]
	for (const one of all) {
		if (performance.now() > until) break
		reached += 1
		if ((await step(one)).ok) done += 1
	}
	return { done, reached }
}
