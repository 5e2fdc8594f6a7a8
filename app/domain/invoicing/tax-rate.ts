import { compareDays, type Day } from "~/domain/calendar"

/** A rate of sales tax at a place from a day on, in basis points. */
export type TaxRate = { place: string; validFrom: Day; basisPoints: number }

/**
 * The rate in force at a place on a day: the latest that has begun; null when none has. Places are compared without regard
 * to case and outer blanks. Local rules decide which place and which rate apply.
 */
export function rateOn(rates: readonly TaxRate[], place: string, day: Day): TaxRate | null {
	const begun = rates.filter((rate) => samePlace(rate.place, place) && compareDays(rate.validFrom, day) <= 0)
	return begun.toSorted((a, b) => compareDays(b.validFrom, a.validFrom))[0] ?? null
}

function samePlace(a: string, b: string): boolean {
	return a.trim().toLowerCase() === b.trim().toLowerCase()
}
