import { addDays, type Day, daysBetween, weekday } from "~/domain/calendar"
import { type FinishShares, stageOf } from "./finish-shares"
import { CAPPING_BEGUN, checkBefore, isFlowCutOff, isReady, latestCheck, type SuperFacts } from "./super-facts"

/** Pieces of one super or of many; fractions until `wholePieces` rounds them. low <= likely <= high. */
export type ExpectedPieces = { low: number; likely: number; high: number }

/** Pieces of one product that should come off on one day, or in the week that begins on `on`. */
export type ExpectedSupply = ExpectedPieces & { productId: string; on: Day }

/** Days from bare to filled, and from the first cap to the last, in a usual flow; common practice, no source. */
const USUAL_DAYS = { toFill: 14, toCap: 10 }

/** A bee escape clears a super in one to two days; common practice, no source. */
const CLEARING_DAYS = 2

/** Beyond so many days a straight line says nothing. */
const FARTHEST_DAYS = 60

/** What the forecast of a super rests on besides its checks. */
type ForecastFacts = { today: Day; readyCappedPercent: number }

/**
 * The day a super should come off, tomorrow at the earliest: the straight line through the capped shares of its last two
 * checks (of different days), carried on to the ready share and rounded up to a day. Where capping has hardly begun (under
 * 25 %) or has not risen between them, or there is one check or none, the usual pace of filling and capping from the last check, or from the day it was
 * set on. With the bee escape in, two days after that. At most 60 days ahead.
 */
export function readyDay(facts: SuperFacts, { today, readyCappedPercent }: ForecastFacts): Day {
	const [from, days] = wayToReady(facts, readyCappedPercent)
	const ahead = Math.ceil(days) - daysBetween(from, today)
	return addDays(today, Math.min(FARTHEST_DAYS, Math.max(1, ahead)))
}

function wayToReady(facts: SuperFacts, ready: number): [from: Day, days: number] {
	const latest = latestCheck(facts)
	if (facts.state === "clearing" && facts.clearingOn) return [facts.clearingOn, CLEARING_DAYS]
	if (!latest) return [facts.setOn, usualDays(0, 0, ready)]
	if (isReady(facts, ready)) return [latest.checkedOn, 0]
	// Nothing more is filled: what is filled is capped at the usual pace, and then all is done that will be done.
	if (isFlowCutOff(facts)) {
		return [latest.checkedOn, usualDays(100, latest.cappedPercent, Math.min(ready, latest.filledPercent))]
	}
	const before = checkBefore(facts)
	const risen = before ? latest.cappedPercent - before.cappedPercent : 0
	if (!before || risen <= 0 || latest.cappedPercent < CAPPING_BEGUN) {
		return [latest.checkedOn, usualDays(latest.filledPercent, latest.cappedPercent, ready)]
	}
	const daily = risen / daysBetween(before.checkedOn, latest.checkedOn)
	return [latest.checkedOn, (ready - latest.cappedPercent) / daily]
}

function usualDays(filledPercent: number, cappedPercent: number, ready: number): number {
	return ((100 - filledPercent) * USUAL_DAYS.toFill + Math.max(0, ready - cappedPercent) * USUAL_DAYS.toCap) / 100
}

/**
 * The pieces a super should come to: its capacity times what supers at its stage come to (`finishSharesByStage`). Once
 * the flow is cut off no more is filled: at most the filled share is likely, and at the low figure the capped share alone.
 */
export function expectedPieces(facts: SuperFacts, sharesByStage: readonly FinishShares[]): ExpectedPieces {
	const shares = sharesByStage[stageOf(facts)]
	if (!shares) throw new RangeError("there are shares for every stage")
	const latest = latestCheck(facts)
	const most =
		latest && isFlowCutOff(facts)
			? { low: latest.cappedPercent / 100, likely: latest.filledPercent / 100, high: latest.filledPercent / 100 }
			: { low: 1, likely: 1, high: 1 }
	const pieces = (figure: keyof ExpectedPieces) => facts.capacityPieces * Math.min(shares[figure], most[figure])
	return { low: pieces("low"), likely: pieces("likely"), high: pieces("high") }
}

/** Whole pieces, rounded once and carefully: low down, likely to the nearest, high up. The order is kept. */
function wholePieces({ low, likely, high }: ExpectedPieces): ExpectedPieces {
	// A millionth of a piece either way is what adding fractions leaves, not a piece.
	return { low: Math.floor(low + 1e-6), likely: Math.round(likely), high: Math.ceil(high - 1e-6) }
}

/**
 * Whole pieces by product and day, from the supers on the hives, by product and then day. Low figures are added as they
 * are: supers of one season stand in the same weather, so they fall short together.
 */
export function expectedByDay(
	supers: readonly (SuperFacts & { productId: string })[],
	facts: ForecastFacts & { sharesByStage: readonly FinishShares[] },
): ExpectedSupply[] {
	return summed(
		supers
			.filter((one) => one.state !== "off")
			.map((one) => ({
				productId: one.productId,
				on: readyDay(one, facts),
				...expectedPieces(one, facts.sharesByStage),
			})),
	).map((supply) => ({ ...supply, ...wholePieces(supply) }))
}

/** The same by week: `on` is the Monday. Sums of whole pieces, so weeks and days agree. */
export function expectedByWeek(days: readonly ExpectedSupply[]): ExpectedSupply[] {
	return summed(days.map((supply) => ({ ...supply, on: mondayOf(supply.on) })))
}

/** The Monday of the week in which `day` lies. */
export function mondayOf(day: Day): Day {
	return addDays(day, 1 - weekday(day))
}

function summed(supplies: readonly ExpectedSupply[]): ExpectedSupply[] {
	const sums = new Map<string, ExpectedSupply>()
	for (const { productId, on, low, likely, high } of supplies) {
		const sum = sums.get(`${productId} ${on}`) ?? { productId, on, low: 0, likely: 0, high: 0 }
		sums.set(`${productId} ${on}`, { ...sum, low: sum.low + low, likely: sum.likely + likely, high: sum.high + high })
	}
	return [...sums.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, sum]) => sum)
}
