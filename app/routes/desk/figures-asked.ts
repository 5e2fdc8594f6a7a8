import { yearOf } from "~/domain/books/period"
import type { Day } from "~/domain/calendar"
import { QUIET_WEEKS } from "~/ui/figures/sleeping-part"
import { type AskedPeriod, askedPeriod } from "./books-period"

/** What the address asks for: the days, this season unless said, and for how long a store that sleeps has been quiet. */
export function askedFigures(url: URL, today: Day): AskedPeriod & { quietWeeks: number } {
	const quiet = Number(url.searchParams.get("quiet"))
	return {
		...askedPeriod(url, today, { usual: yearOf(today) }),
		quietWeeks: QUIET_WEEKS.find((weeks) => weeks === quiet) ?? 6,
	}
}
