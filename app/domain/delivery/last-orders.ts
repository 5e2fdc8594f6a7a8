import { type Day, dayInZone, daysBetween, dayWords, timeWords, weekday, weekdayName } from "~/domain/calendar"

/** A cut-off as a letter says it: "noon on Friday, August 14", by the clocks of `zone`. */
export function cutoffWords(cutoffAt: Date, zone: string): string {
	return `${timeWords(cutoffAt, zone)} on ${dayWords(dayInZone(cutoffAt, zone))}`
}

/**
 * A cut-off as a page says it on `today`: "Friday at noon" within the week before it, else with its date,
 * "Friday, August 28 at noon"; "today at noon" and "tomorrow at noon" when it is that near.
 */
export function cutoffSoonWords(cutoffAt: Date, zone: string, today: Day): string {
	const on = dayInZone(cutoffAt, zone)
	const ahead = daysBetween(today, on)
	const day =
		ahead === 0 ? "today" : ahead === 1 ? "tomorrow" : ahead > 0 && ahead < 7 ? weekdayName(weekday(on)) : dayWords(on)
	return `${day} at ${timeWords(cutoffAt, zone)}`
}
