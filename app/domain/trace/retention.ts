import { type Day, daysBetween, endOfMonth } from "../calendar"

/** Records are to be at hand this soon after an official request. Source: 21 CFR 1.361, from memory (high). */
export const AT_HAND_WITHIN_HOURS = 24

/** Months that a record must be kept. */
export type KeepMonths = 6 | 12 | 24

/**
 * How long a record of food that came or went on `on` must be kept, by the day on which the food is likely to spoil or
 * to lose its value: within 60 days 6 months, later but within 6 months 12, and else 24. Throws RangeError when either
 * is no day. Source: 21 CFR 1.360, from memory (high); 21 U.S.C. 350c(b) allows no more than two years.
 */
export function keepMonths(on: Day, losesValueOn: Day): KeepMonths {
	if (daysBetween(on, losesValueOn) <= 60) return 6
	return losesValueOn <= addMonths(on, 6) ? 12 : 24
}

/** The last day on which the record must still be there. Nothing of it may be cleared away before the day after. */
export function keepUntil(on: Day, months: KeepMonths): Day {
	return addMonths(on, months)
}

/** Comb honey keeps for longer than six months. This product keeps what it records for at least so long. */
export const HONEY_KEEP_MONTHS: KeepMonths = 24

/** Whether the record of food that came or went on `on` may be cleared away on `today`. */
export function mayBeCleared(on: Day, today: Day): boolean {
	return today > keepUntil(on, HONEY_KEEP_MONTHS)
}

/** The same day of the month `months` later, or the last of that month where it has no such day. */
function addMonths(day: Day, months: number): Day {
	const count = Number(day.slice(0, 4)) * 12 + Number(day.slice(5, 7)) - 1 + months
	const month = `${String(Math.floor(count / 12)).padStart(4, "0")}-${String((count % 12) + 1).padStart(2, "0")}`
	const last = endOfMonth(`${month}-01`)
	const same = `${month}-${day.slice(8)}`
	return same < last ? same : last
}
