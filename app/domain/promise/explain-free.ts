import { compareDays, type Day } from "~/domain/calendar"
import { type AssignableLot, type AssignableOrder, assignLots } from "./assign-lots"
import { canServe, type PromisedQuantity, type Supply } from "./free-to-promise"

/**
 * Whether a supply counts for the day asked about, and why: it is there that day; it is over by then, and counted since
 * earlier promises that take it would otherwise take from the day, or left out; it comes after, and is counted since
 * later promises need it, or left out.
 */
export type SupplyPart = "there" | "over-but-needed" | "over" | "later-but-needed" | "later"

/** Whether a promise takes from the day asked about, or is met by what cannot serve the day anyway. */
export type PromisePart = "takes" | "met-apart"

export type Explanation<S, P> = {
	supplies: (S & { part: SupplyPart })[]
	promises: (P & { part: PromisePart })[]
	/** Sums of the parts that count; supplied - promised - reserve = raw. */
	supplied: number
	promised: number
	reserve: number
	raw: number
	free: number
	/** The last day whose promises bind the figure: the day itself, or a later one. */
	tightestOn: Day
}

/** Whether a supply of that part is in the sum. */
export function countsIn(part: SupplyPart): boolean {
	return part === "there" || part.endsWith("needed")
}

/**
 * Takes a figure of free to promise apart: which supplies and promises make it. Answers those days, the day asked about
 * among them, whose promises leave the least of all that can serve any of them; every supply that can serve one of these
 * days counts, and every promise of one of them. The sums give exactly the figure of `freeToPromise`. Order of supplies and
 * promises is kept; quantities are whole pieces, not negative. Throws RangeError where they are not.
 */
export function explainFree<S extends Supply, P extends PromisedQuantity>(outlook: {
	supplies: readonly S[]
	promises: readonly P[]
	reserve: number
	day: Day
}): Explanation<S, P> {
	const { day, reserve } = outlook
	const over = outlook.supplies.filter((supply) => supply.until !== undefined && supply.until < day)
	const later = outlook.supplies.filter((supply) => supply.on > day)
	const binding = new Set([
		day,
		...bindingDays(
			over,
			outlook.promises.filter((promise) => promise.on < day),
		),
		...bindingDays(
			later,
			outlook.promises.filter((promise) => promise.on > day),
		),
	])
	const days = [...binding].toSorted(compareDays)
	const partOf = (supply: Supply): SupplyPart => {
		if (canServe(supply, day)) return "there"
		const isNeeded = days.some((other) => canServe(supply, other))
		if (supply.on > day) return isNeeded ? "later-but-needed" : "later"
		return isNeeded ? "over-but-needed" : "over"
	}
	const supplies = outlook.supplies.map((supply) => ({ ...supply, part: partOf(supply) }))
	const promises = outlook.promises.map((promise) => ({
		...promise,
		part: binding.has(promise.on) ? ("takes" as const) : ("met-apart" as const),
	}))
	const supplied = sum(supplies.filter(({ part }) => countsIn(part)))
	const promised = sum(promises.filter(({ part }) => part === "takes"))
	const raw = supplied - promised - reserve
	const tightestOn = days.at(-1) ?? day
	return { supplies, promises, supplied, promised, reserve, raw, free: Math.max(0, raw), tightestOn }
}

function sum(entries: readonly { quantity: number }[]): number {
	return entries.reduce((total, { quantity }) => total + quantity, 0)
}

/**
 * The days whose promises ask for more than these supplies have: those with something missing, and every day that the
 * supplies which can serve them are given to, and so on. Empty where nothing is missing.
 */
function bindingDays(supplies: readonly Supply[], promises: readonly PromisedQuantity[]): Set<Day> {
	const lots = supplies.map(
		({ on, until, quantity }, index): AssignableLot => ({
			lotId: String(index),
			availableFrom: on,
			bestBefore: until ?? "9999-12-31",
			pieces: quantity,
		}),
	)
	const orders = byDay(promises)
	const assigned = assignLots({ lots, orders })
	if (assigned.ok) return new Set()
	const days = new Set(assigned.missing.map(({ orderId }) => orderId))
	let apart = lots
	for (let wasFound = true; wasFound; ) {
		const reached = apart.filter((lot) => [...days].some((on) => lot.availableFrom <= on && on <= lot.bestBefore))
		const ids = new Set(reached.map(({ lotId }) => lotId))
		for (const { lotId, orderId } of assigned.picks) if (ids.has(lotId)) days.add(orderId)
		apart = apart.filter(({ lotId }) => !ids.has(lotId))
		wasFound = reached.length > 0
	}
	return days
}

/** One order for each day, named by the day. */
function byDay(promises: readonly PromisedQuantity[]): AssignableOrder[] {
	const pieces = new Map<Day, number>()
	for (const { on, quantity } of promises) pieces.set(on, (pieces.get(on) ?? 0) + quantity)
	return [...pieces].map(([on, quantity]) => ({ orderId: on, on, pieces: quantity }))
}
