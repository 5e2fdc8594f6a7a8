import { addDays, type Day, weekday } from "~/domain/calendar"
import type { BookAccountKey } from "./accounts"
import { type BookEvent, entriesOf } from "./entries"

/** An event on the day on which it is entered, with what the file says of it. */
export type DatedEvent = {
	on: Day
	event: BookEvent
	about: string
	/** The store or market that it is about, by id; null where it is about none. */
	withId: string | null
	/** The number that stands on the paper. */
	document: string
}

/** Where money is ours: what moves between these is neither in nor out. */
const MONEY: readonly BookAccountKey[] = ["cash", "bank", "stripe", "disputes"]

/** What came in and what went out in a week; `weekOn` is its Monday. In cents. */
export type MoneyWeek = { weekOn: Day; inCents: number; outCents: number }

/** Money in and out by week, every week from the one of `from` to the one of `to`, also those in which nothing moved. */
export function moneyByWeek(
	events: readonly { on: Day; event: BookEvent }[],
	{ from, to }: { from: Day; to: Day },
): MoneyWeek[] {
	const weeks = new Map<Day, MoneyWeek>()
	for (let weekOn = mondayOf(from); weekOn <= to; weekOn = addDays(weekOn, 7))
		weeks.set(weekOn, { weekOn, inCents: 0, outCents: 0 })
	for (const { on, event } of events) {
		const week = weeks.get(mondayOf(on))
		if (!week) throw new RangeError(`not a day of the period: ${on}`)
		const moved = movedCents(event)
		if (moved > 0) week.inCents += moved
		else week.outCents -= moved
	}
	return [...weeks.values()]
}

/** By how much an event changes the money that is ours. */
function movedCents(event: BookEvent): number {
	return entriesOf(event)
		.filter(({ account }) => MONEY.includes(account))
		.reduce((sum, { debitCents, creditCents }) => sum + debitCents - creditCents, 0)
}

/** The Monday of a day's week. */
export function mondayOf(day: Day): Day {
	return addDays(day, 1 - weekday(day))
}
