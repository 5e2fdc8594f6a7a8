import { addDays, type Day, daysBetween, weekday } from "~/domain/calendar"
import { firstDeliveryDay } from "~/domain/delivery/delivery-days"
import { cadenceOf } from "./cadence"
import { occurrences } from "./recurrence"

/** One date of a standing order. */
export type StandingDate = {
	/** The date by the rule: the name of this date, whatever day the van comes. */
	ruleOn: Day
	/** The day the van comes; later than `ruleOn` when that is shut or no delivery day. */
	deliveryOn: Day
	isMoved: boolean
	/** Whether nothing comes: skipped by the store, or within a pause. */
	isSkipped: boolean
}

/** A standing order's rule and what bends it. */
export type StandingRule = {
	rule: string
	startsOn: Day
	endsOn: Day | null
	/** From this day on every date is skipped; null while it runs. */
	pausedFrom: Day | null
	/** The last day of the pause; null or left out, until it is resumed. */
	pausedUntil?: Day | null
	/** ISO weekdays on which the van comes to the store, 1 Monday to 7 Sunday. */
	deliveryWeekdays: readonly number[]
	shutDays: readonly Day[]
	/** Dates by the rule on which the store wants nothing. */
	skips: readonly Day[]
}

/**
 * The day from which the weeks are counted: the first date that the weekday allows on or after `startsOn`, so that "every
 * other Tuesday from Thursday" begins on the next Tuesday and not in the week after. Where that is before `from`, the
 * last day before it from which the rule falls on the same dates: standing orders of one rule then share their dates.
 */
function anchor(rule: string, startsOn: Day, from: Day): Day {
	const cadence = cadenceOf(rule)
	if (!cadence) throw new RangeError(`not the rule of a standing order: ${rule}`)
	if (cadence.every === "month") return from > startsOn ? from : startsOn
	const first = addDays(startsOn, (cadence.weekday - weekday(startsOn) + 7) % 7)
	const period = 7 * cadence.interval
	return from > first ? addDays(first, Math.floor(daysBetween(first, from) / period) * period) : first
}

/**
 * The next `count` dates of a standing order whose delivery is on or after `from`, skipped ones among them and marked.
 * A date on a shut day, or on a weekday when the van does not come, moves to the store's next delivery day after it. A
 * date that would move onto or past the rule's next date is dropped: the van comes once for both. No delivery falls after
 * `endsOn`. Fewer come back when the order ends or no delivery day is left within a year of a date. Throws RangeError on
 * a rule that `ruleOf` does not write. `datesOf` is `occurrences`, or the same with a memory. Moving and dropping are this product's own rule.
 */
export function nextDeliveryDates(
	standing: StandingRule,
	from: Day,
	count: number,
	datesOf: typeof occurrences = occurrences,
): StandingDate[] {
	const { deliveryWeekdays, shutDays, endsOn } = standing
	if (cadenceOf(standing.rule) === null) throw new RangeError(`not the rule of a standing order: ${standing.rule}`)
	if (deliveryWeekdays.length === 0 || count <= 0) return []
	// Dates lie a week or more apart, and only a shut day on which the van would come can bend one. A date from before
	// `from` reaches past it only over shut days that lie before it; each shut day drops at most one date; and one date
	// more says what comes next.
	const bending = shutDays.filter((day) => deliveryWeekdays.includes(weekday(day)))
	const weeksBack = bending.filter((day) => day < from).length + 1
	const earliest = addDays(from, -7 * weeksBack)
	const ruleDays = datesOf({
		rule: standing.rule,
		startsOn: anchor(standing.rule, standing.startsOn, earliest),
		from: earliest,
		...(endsOn === null ? {} : { until: endsOn }),
		count: count + weeksBack + bending.length + 1,
	})

	const dates: StandingDate[] = []
	for (const [index, ruleOn] of ruleDays.entries()) {
		if (dates.length === count) break
		const deliveryOn = firstDeliveryDay({ from: ruleOn, deliveryWeekdays, shutDays })
		const next = ruleDays[index + 1]
		if (deliveryOn === null || deliveryOn < from || (endsOn !== null && deliveryOn > endsOn)) continue
		if (deliveryOn !== ruleOn && next !== undefined && next <= deliveryOn) continue
		dates.push({
			ruleOn,
			deliveryOn,
			isMoved: deliveryOn !== ruleOn,
			isSkipped: isWithinPause(standing, ruleOn) || standing.skips.includes(ruleOn),
		})
	}
	return dates
}

/** Whether a date by the rule lies within the pause, whose first and last day belong to it. */
export function isWithinPause(pause: Pick<StandingRule, "pausedFrom" | "pausedUntil">, ruleOn: Day): boolean {
	const { pausedFrom, pausedUntil = null } = pause
	return pausedFrom !== null && ruleOn >= pausedFrom && (pausedUntil === null || ruleOn <= pausedUntil)
}
