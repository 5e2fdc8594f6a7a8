import { type Day, weekday } from "~/domain/calendar"
import { cutoffAt, isOpen } from "~/domain/delivery/delivery-days"
import { cadenceOf } from "~/domain/standing-orders/cadence"
import { nextDeliveryDates, type StandingDate } from "~/domain/standing-orders/delivery-dates"
import { type occurrences, rememberedOccurrences } from "~/domain/standing-orders/recurrence"
import type { DeliverySchedule } from "~/services/delivery/find-delivery-days.server"

/** What decides the dates of a standing order; `createdAt` is null for one that is not saved yet. */
export type DatedRule = {
	rule: string
	startsOn: Day
	endsOn: Day | null
	pausedFrom: Day | null
	pausedUntil: Day | null
	skips: readonly Day[]
	createdAt: Date | null
	endedAt: Date | null
}

/** A date of a standing order with its last orders. */
export type DueDate = StandingDate & { cutoffAt: Date; isOpen: boolean }

/** What many standing orders of one producer have in common: the dates of a rule, and the last orders of a day. */
type DateMemory = { datesOf: typeof occurrences; cutoffAt: typeof cutoffAt }

/** A memory for the standing orders of one producer, which has one round for each weekday. */
export function newDateMemory(): DateMemory {
	const known = new Map<Day, Date>()
	return {
		datesOf: rememberedOccurrences(),
		cutoffAt: (deliveryOn, round, zone) => {
			const closesAt = known.get(deliveryOn) ?? cutoffAt(deliveryOn, round, zone)
			known.set(deliveryOn, closesAt)
			return closesAt
		},
	}
}

/**
 * The next `count` dates from today on that are this standing order's to make: last orders fall after it was set and, where
 * it has ended, no later than its end. A date closes at the cut-off of the day on which the van really comes. A rule that
 * nobody here writes has no dates, so that one spoilt row stops neither the others nor a page.
 */
export function standingDates(
	standing: DatedRule,
	schedule: DeliverySchedule,
	count: number,
	memory: DateMemory = newDateMemory(),
): DueDate[] {
	const { rounds, shutDays, zone, today, now } = schedule
	if (cadenceOf(standing.rule) === null) return []
	const since = standing.createdAt ?? now
	// Cut-offs lie at most a fortnight ahead: at most fifteen daily dates can have closed before it was set.
	const dates = nextDeliveryDates(
		{ ...standing, deliveryWeekdays: rounds.map((round) => round.weekday), shutDays },
		today,
		count + 15,
		memory.datesOf,
	)
	return dates
		.flatMap((date) => {
			const round = rounds.find((one) => one.weekday === weekday(date.deliveryOn))
			if (!round) return []
			const closesAt = memory.cutoffAt(date.deliveryOn, round, zone)
			if (closesAt <= since || (standing.endedAt && closesAt > standing.endedAt)) return []
			return { ...date, cutoffAt: closesAt, isOpen: isOpen({ cutoffAt: closesAt }, now) }
		})
		.slice(0, count)
}
