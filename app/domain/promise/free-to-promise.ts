import { compareDays, type Day } from "~/domain/calendar"
import { type Span, servedAfter, servedBefore } from "./serve-apart"

/** How sure a supply is: released and free now, held until treated or weighed, expected from the hives. */
export type SupplyKind = "free" | "held" | "expected"

/**
 * What will be there from a day on, in cases or pieces. `until` is the last day that it can serve, its best-before; left
 * out where it keeps for good.
 */
export type Supply = { on: Day; until?: Day | undefined; quantity: number; kind: SupplyKind }

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

/** Whether a supply can serve a promise of that day. */
export function canServe(supply: Pick<Supply, "on" | "until">, day: Day): boolean {
	return supply.on <= day && (supply.until === undefined || day <= supply.until)
}

/**
 * What is free to promise for each of `days`: the largest quantity that can be promised for that day while every promise
 * there is, of that day, an earlier or a later one, still has a supply that is there in time and keeps until then; less
 * the reserve. A promise that nothing can serve is still owed, and is taken off too.
 *
 * With any amount asked for day t, every supply that can serve t goes out; what is over by t can serve earlier promises
 * only, and what comes after t later ones only. So the most that can go out is those three together, and what is free is
 * that less all promises. Where nothing expires, this is the least, over all days s on or after t, of what is supplied
 * by s less what is promised by s.
 *
 * Answers in the order of `days`, in the unit of the outlook; takes time in proportion to the entries, but for the
 * sorting. Promises of a day are summed, and a sum below zero counts as none. Refuses nothing. Source: the APICS
 * Dictionary's cumulative available-to-promise with look-ahead, held by the published values "planning"; expiry and the
 * reserve are this product's own, held against a maximum flow found by a general solver.
 */
export function freeToPromise(outlook: Outlook & { days: readonly Day[] }): FreeOnDay[] {
	const { supplies, promises, reserve } = outlook
	const entryDays = [
		...supplies.flatMap(({ on, until }) => (until ? [on, until] : [on])),
		...promises.map(({ on }) => on),
	]
	const allDays = [...new Set([...outlook.days, ...entryDays])].toSorted(compareDays)
	const indexOf = new Map(allDays.map((day, index) => [day, index]))
	const promised = allDays.map(() => 0)
	for (const { on, quantity } of promises) {
		const index = indexOf.get(on) as number
		promised[index] = (promised[index] as number) + quantity
	}
	const owed = promised.map((quantity) => Math.max(0, quantity))
	const owedInAll = owed.reduce((sum, quantity) => sum + quantity, 0)
	const spans = supplies.map(({ on, until, quantity }) => ({
		first: indexOf.get(on) as number,
		last: until === undefined ? allDays.length - 1 : (indexOf.get(until) as number),
		quantity,
	}))
	const there = thereOnEach(spans, allDays.length)
	const before = servedBefore(spans, owed)
	const after = servedAfter(spans, owed)
	return outlook.days.map((day) => {
		const index = indexOf.get(day) as number
		const mostOut = (there[index] as number) + (before[index] as number) + (after[index] as number)
		const raw = mostOut - owedInAll - reserve
		return { day, free: Math.max(0, raw), raw }
	})
}

/** For each day, all that can serve it. */
function thereOnEach(spans: readonly Span[], days: number): number[] {
	const change = Array.from({ length: days + 1 }, () => 0)
	for (const { first, last, quantity } of spans) {
		if (last < first) continue
		change[first] = (change[first] as number) + quantity
		change[last + 1] = (change[last + 1] as number) - quantity
	}
	let total = 0
	return change.slice(0, days).map((step) => {
		total += step
		return total
	})
}
