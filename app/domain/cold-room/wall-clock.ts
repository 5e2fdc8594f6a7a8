import { Temporal } from "temporal-polyfill"
import { instantAt } from "../calendar"

/**
 * Times of a logger without a zone are kept as milliseconds that the wall clock shows, as if in UTC; these turn a moment
 * into such a time and back. A time that the clock shows twice is the first; one it skips is moved forward by the gap.
 */
export function wallOfMoment(moment: number, zone: string): number {
	const offset = Temporal.Instant.fromEpochMilliseconds(moment).toZonedDateTimeISO(zone).offsetNanoseconds
	return moment + offset / 1_000_000
}

export function momentOfWall(wall: number, zone: string): number {
	const plain = Temporal.Instant.fromEpochMilliseconds(wall).toZonedDateTimeISO("UTC").toPlainDateTime()
	return plain.toZonedDateTime(zone, { disambiguation: "compatible" }).epochMilliseconds
}

const DAY = 86_400_000

/** Answers whether clocks in a zone are put forward or back on the day of a wall-clock time; asks the calendar once a day. */
export function shiftDaysOf(zone: string): (wall: number) => boolean {
	const known = new Map<number, boolean>()
	return (wall) => {
		const day = Math.floor(wall / DAY)
		const isKnown = known.get(day)
		if (isKnown !== undefined) return isKnown
		const isShift = momentOfWall((day + 1) * DAY, zone) - momentOfWall(day * DAY, zone) !== DAY
		known.set(day, isShift)
		return isShift
	}
}

/** A moment as the field for a date and time shows it: "2026-08-13T14:05". */
export function localMinute(moment: Date, zone: string): string {
	return new Date(wallOfMoment(moment.getTime(), zone)).toISOString().slice(0, 16)
}

/** The moment that a field for a date and time names in a zone; null when it is none. */
export function momentNamed(text: string, zone: string): Date | null {
	const [, day, time] = /^(\d{4}-\d{2}-\d{2})T(\d{2}:\d{2})(?::\d{2}(?:\.\d+)?)?$/.exec(text) ?? []
	if (!day || !time) return null
	try {
		return instantAt(day, time, zone)
	} catch {
		return null
	}
}
