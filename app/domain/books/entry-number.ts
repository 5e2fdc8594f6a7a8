import type { Day } from "~/domain/calendar"

/**
 * "20260818-003" for the third entry of a day: the same whatever period is asked for. What is entered later on a day that is
 * still open may move those after it; on a closed day nothing moves. Numbers begin with 1: RangeError for any other.
 */
export function entryNumber(day: Day, ordinal: number): string {
	if (!Number.isSafeInteger(ordinal) || ordinal < 1) throw new RangeError(`not an ordinal: ${ordinal}`)
	return `${day.replaceAll("-", "")}-${String(ordinal).padStart(3, "0")}`
}
