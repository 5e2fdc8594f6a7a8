import { addDays, compareDays, type Day } from "~/domain/calendar"

/** Days that freezing and weighing usually take; common practice, no source. */
const DAYS_TO_RELEASE = 3

/** The day on which a new lot is likely to be released, never after its best before. */
export function likelyReleaseOn(madeOn: Day, bestBeforeOn: Day): Day {
	const [first] = [addDays(madeOn, DAYS_TO_RELEASE), bestBeforeOn].sort(compareDays)
	return first as Day
}
