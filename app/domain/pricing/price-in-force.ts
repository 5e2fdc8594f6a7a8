import { compareDays, type Day } from "../calendar"
import { percentOf, weighedPriceCents } from "../money"

const WHOLE = 10_000

/** A price with the day from which it holds. `poundCents` is set where the product is priced by weight. */
export type DatedPrice = {
	minCases: number
	caseCents: number
	poundCents: number | null
	validFrom: Day
	/** The last day of a store's own price; null or left out = until another takes its place. */
	validUntil?: Day | null
}

/** So much off between two days, both included, in hundredths of a percent. */
type Promotion = { basisPoints: number; startsOn: Day; endsOn: Day }

/**
 * Which of the dated prices of one product hold on `day`: of each break the latest that has begun, unless its last day is
 * past; an earlier price does not come back when a later one has ended. By rising break. This product's own rule.
 */
export function pricesInForce(prices: readonly DatedPrice[], day: Day): DatedPrice[] {
	const begun = prices
		.filter((price) => compareDays(price.validFrom, day) <= 0)
		.toSorted((a, b) => compareDays(a.validFrom, b.validFrom))
	const latest = new Map(begun.map((price) => [price.minCases, price]))
	return [...latest.values()]
		.filter(({ validUntil }) => !validUntil || compareDays(validUntil, day) >= 0)
		.toSorted((a, b) => a.minCases - b.minCases)
}

/**
 * The breaks of one product for one store on `day`, before any promotion. Where the store has a price of its own in force,
 * its own breaks stand for the product and none of the tier's: what was agreed is not undercut or overtaken by a tier.
 * This product's own rule.
 */
export function breaksForStore(
	prices: { own: readonly DatedPrice[]; tier: readonly DatedPrice[] },
	day: Day,
): DatedPrice[] {
	const own = pricesInForce(prices.own, day)
	return own.length > 0 ? own : pricesInForce(prices.tier, day)
}

/** How much comes off on `day`: the largest of the promotions that run, 0 where none does. They are never added up. */
export function promotionInForce(promotions: readonly Promotion[], day: Day): number {
	return promotions
		.filter(({ startsOn, endsOn }) => compareDays(startsOn, day) <= 0 && compareDays(day, endsOn) <= 0)
		.reduce((most, { basisPoints }) => Math.max(most, basisPoints), 0)
}

/**
 * A price with `basisPoints` hundredths of a percent off, rounded once to whole cents, half up. Never below zero. Throws
 * RangeError on a share outside 0 to 10,000 or a price that is not whole cents.
 */
export function promotedCents(cents: number, basisPoints: number): number {
	if (basisPoints < 0 || basisPoints > WHOLE) throw new RangeError(`not a share of a price: ${basisPoints}`)
	return percentOf(cents, WHOLE - basisPoints)
}

/**
 * What comb priced by weight is likely to come to: its nominal net weight at the price of a pound, rounded once, half up.
 * An estimate for the order; what is owed follows from the weighed net weight by `weighedPriceCents`.
 */
export function estimateCaseCents(
	product: { pieceNetGrams: number; piecesPerCase: number },
	poundCents: number,
): number {
	return weighedPriceCents(product.pieceNetGrams * product.piecesPerCase, "g", poundCents)
}

/**
 * What a case costs at one break with `basisPoints` off. By weight the price of the pound is reduced and the case estimated
 * from it, so that estimate and weighed price follow from one figure.
 */
export function caseCentsAfter(
	price: { caseCents: number; poundCents: number | null },
	product: { pieceNetGrams: number; piecesPerCase: number },
	basisPoints: number,
): { caseCents: number; poundCents: number | null } {
	if (price.poundCents === null) return { caseCents: promotedCents(price.caseCents, basisPoints), poundCents: null }
	const poundCents = promotedCents(price.poundCents, basisPoints)
	return { caseCents: estimateCaseCents(product, poundCents), poundCents }
}
