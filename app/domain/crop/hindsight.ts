import type { Day } from "~/domain/calendar"
import type { ExpectedPieces } from "./forecast"

/** What was expected of a week, as it stood so many weeks ahead. */
export type WeekForecast = ExpectedPieces & { madeOn: Day }

/** A week of one product: what was expected two and four weeks ahead, where it was kept, and what came off. */
export type ForecastWeek = {
	weekOn: Day
	twoAhead: WeekForecast | null
	fourAhead: WeekForecast | null
	/** Finished pieces of the supers that came off in the week. */
	cameOff: number
}

/** How forecasts fared over the weeks for which there is one: counts of weeks. */
type Fared = { weeks: number; within: number; under: number; over: number }

/**
 * How often what came off lay between the low and the high figure, below the low one or above the high one. A week without a
 * forecast that far ahead is not counted.
 */
export function howForecastsFared(weeks: readonly ForecastWeek[], ahead: "twoAhead" | "fourAhead"): Fared {
	const fared: Fared = { weeks: 0, within: 0, under: 0, over: 0 }
	for (const week of weeks) {
		const forecast = week[ahead]
		if (!forecast) continue
		fared.weeks += 1
		if (week.cameOff < forecast.low) fared.under += 1
		else if (week.cameOff > forecast.high) fared.over += 1
		else fared.within += 1
	}
	return fared
}
