import { compareDays, type Day } from "~/domain/calendar"

/** How sure a supply is: released and free now, held until treated or weighed, expected from the hives. */
export type SupplyKind = "free" | "held" | "expected"

/** What will be there from a day on, in cases or pieces. */
export type Supply = { on: Day; quantity: number; kind: SupplyKind }

/** What has been promised for a day, in the same unit. */
export type PromisedQuantity = { on: Day; quantity: number }

/** What can be promised for one day. */
export type FreeOnDay = {
	day: Day
	/** What can still be promised, never below zero. */
	free: number
	/** The same figure as it comes out; below zero, that much is promised beyond the supply. */
	raw: number
}

/** Everything known about one product: supplies and promises in one unit, and the reserve kept for stall and shop. */
export type Outlook = {
	supplies: readonly Supply[]
	promises: readonly PromisedQuantity[]
	reserve: number
}

/** Cumulative figures: `at(day)` is the sum of all entries on or before `day`, for days asked in rising order. */
function runningSum(entries: readonly { on: Day; quantity: number }[]): (day: Day) => number {
	const sorted = entries.toSorted((a, b) => compareDays(a.on, b.on))
	let position = 0
	let total = 0
	return (day) => {
		for (let next = sorted[position]; next && next.on <= day; next = sorted[position]) {
			total += next.quantity
			position += 1
		}
		return total
	}
}

/**
 * What is free to promise for each of `days`: the least, over all days s on or after that day, of what will have been
 * supplied by s, less what is promised by s, less the reserve. Promising that much breaks no earlier promise, for that
 * day or a later one. Answers in the order of `days`, in the unit of the outlook; takes time in proportion to the
 * entries, but for the sorting. Refuses nothing. Source: the APICS Dictionary's cumulative
 * available-to-promise with look-ahead, held by the published values "planning"; the reserve is this product's own.
 */
export function freeToPromise(outlook: Outlook & { days: readonly Day[] }): FreeOnDay[] {
	const eventDays = [...outlook.supplies, ...outlook.promises].map((entry) => entry.on)
	const allDays = [...new Set([...outlook.days, ...eventDays])].toSorted(compareDays)
	const supplied = runningSum(outlook.supplies)
	const promised = runningSum(outlook.promises)
	const standing = allDays.map((day) => supplied(day) - promised(day) - outlook.reserve)

	const rawByDay = new Map<Day, number>()
	let least = Number.POSITIVE_INFINITY
	for (let index = allDays.length - 1; index >= 0; index -= 1) {
		least = Math.min(least, standing[index] as number)
		rawByDay.set(allDays[index] as Day, least)
	}
	return outlook.days.map((day) => {
		const raw = rawByDay.get(day) as number
		return { day, free: Math.max(0, raw), raw }
	})
}
