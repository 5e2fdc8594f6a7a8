import { addDays, type Day, instantAt, weekday } from "~/domain/calendar"

/**
 * A weekly round of the van on an ISO weekday, 1 Monday to 7 Sunday, and when its orders close: at `cutoffTime`
 * ("12:00"), so many days before the delivery.
 */
export type Round = { weekday: number; cutoffDaysBefore: number; cutoffTime: string }

/** A delivery day and the instant at which its orders close. */
export type DeliveryDay = { on: Day; cutoffAt: Date }

/** How far ahead a delivery day is looked for before giving up: a year in which every day is shut has none. */
const SEARCH_DAYS = 366

/** The instant at which orders for the delivery on `on` close, by the clocks of the producer's `zone`. */
export function cutoffAt(on: Day, round: Round, zone: string): Date {
	return instantAt(addDays(on, -round.cutoffDaysBefore), round.cutoffTime, zone)
}

/**
 * The next `count` delivery days on or after `from`, shut days left out, each with the instant at which its orders close.
 * A day whose orders have closed is among them: `isOpen` tells. Fewer come back where the rounds have no more within a
 * year. Of two rounds on one weekday the first given counts. Throws RangeError on an unknown day, time or zone.
 */
export function nextDeliveryDays(search: {
	rounds: readonly Round[]
	shutDays: readonly Day[]
	zone: string
	from: Day
	count: number
}): DeliveryDay[] {
	const shut = new Set(search.shutDays)
	const found: DeliveryDay[] = []
	for (let ahead = 0; ahead <= SEARCH_DAYS && found.length < search.count; ahead += 1) {
		const on = addDays(search.from, ahead)
		const round = search.rounds.find((one) => one.weekday === weekday(on))
		if (round && !shut.has(on)) found.push({ on, cutoffAt: cutoffAt(on, round, search.zone) })
	}
	return found
}

/** Whether orders are still taken for a delivery day: until, and not at, its cut-off. */
export function isOpen(day: { cutoffAt: Date }, now: Date): boolean {
	return now.getTime() < day.cutoffAt.getTime()
}

/** The first day on or after `from` that is one of the weekdays and not shut; null where there is none within a year. */
export function firstDeliveryDay(search: {
	from: Day
	deliveryWeekdays: readonly number[]
	shutDays: readonly Day[]
}): Day | null {
	for (let ahead = 0; ahead <= SEARCH_DAYS; ahead += 1) {
		const on = addDays(search.from, ahead)
		if (search.deliveryWeekdays.includes(weekday(on)) && !search.shutDays.includes(on)) return on
	}
	return null
}
