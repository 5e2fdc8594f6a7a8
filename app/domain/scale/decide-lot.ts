import {
	asNumber,
	compare,
	exactly,
	type Fraction,
	fraction,
	meanOf,
	minus,
	negative,
	over,
	sumOf,
	times,
	ZERO,
} from "./fraction"

/** What the decision rests on, all in one unit. `variations` has one figure for each package, or one for all. */
export type LotFacts = {
	errors: readonly Fraction[]
	variations: Fraction | readonly Fraction[]
	shortAllowed: number
	/** Null where the average is not asked for: a lot of one package. */
	correctionFactor: string | number | null
	/** Meat and poultry at an inspected packer: a negative average fails at once. Never for honey. */
	withoutLimit?: boolean
}

/** Both tests and the verdict. `limit` is null where the method computes none: the average is not below zero. */
export type LotDecision = {
	total: Fraction
	average: Fraction
	/** Squared, so that it stays exact; null for one package. */
	variance: Fraction | null
	deviation: number | null
	limit: number | null
	/** Packages short by more than the variation, by their places in the sample. */
	tooShort: number[]
	/** Packages short by exactly the variation: they count as within it. */
	justWithin: number[]
	variationMet: boolean
	isAverageAsked: boolean
	averageMet: boolean
	/** The average is short by exactly the limit, which the handbook does not speak of: taken as met. */
	isAverageAtLimit: boolean
	isMet: boolean
}

/** The sample variance, with n - 1; null for fewer than two. */
function sampleVariance(errors: readonly Fraction[]): Fraction | null {
	if (errors.length < 2) return null
	const average = meanOf(errors)
	const squares = errors.map((error) => times(minus(error, average), minus(error, average)))
	return over(sumOf(squares), fraction(BigInt(errors.length - 1)))
}

/**
 * Decides a lot by its package errors (weight less label; short is negative). It passes when no more packages than allowed
 * are short by more than the variation, and when the average is not below zero or not further below than the sample
 * error limit: standard deviation (n - 1) times the sample correction factor. The comparison is made on squares, exactly.
 * Throws RangeError without errors. Source: NIST Handbook 133 (2026), 2.3.6 and 2.3.7; equality as a pass is our choice.
 */
export function decideLot(facts: LotFacts): LotDecision {
	const { errors, shortAllowed, correctionFactor } = facts
	const [only] = [facts.variations].flat()
	const variationOf = (place: number) => (Array.isArray(facts.variations) ? facts.variations[place] : only) as Fraction
	const beyond = errors.map((error, place) => compare(error, negative(variationOf(place))))
	const placesWhere = (sign: number) => beyond.flatMap((way, place) => (way === sign ? [place] : []))
	const tooShort = placesWhere(-1)

	const average = meanOf(errors)
	const variance = sampleVariance(errors)
	const isBelow = compare(average, ZERO) < 0
	const factor = correctionFactor === null ? null : exactly(correctionFactor)
	const squaredLimit = factor && variance && times(times(factor, factor), variance)
	const against = isBelow && squaredLimit ? compare(times(average, average), squaredLimit) : null
	const isAverageAsked = factor !== null || facts.withoutLimit === true
	const averageMet = !isAverageAsked || !isBelow || (against !== null && against <= 0)
	const variationMet = tooShort.length <= shortAllowed
	return {
		total: sumOf(errors),
		average,
		variance,
		deviation: variance && Math.sqrt(asNumber(variance)),
		limit: isBelow && squaredLimit ? Math.sqrt(asNumber(squaredLimit)) : null,
		tooShort,
		justWithin: placesWhere(0),
		variationMet,
		isAverageAsked,
		averageMet,
		isAverageAtLimit: against === 0,
		isMet: variationMet && averageMet,
	}
}

/**
 * An error in units of measure, the smallest decimal place of the scale: -0.5 g at 0.1 g is -5. Source: NIST Handbook 133
 * (2026), 2.3.3.1. Throws RangeError on a unit of zero.
 */
export function inUnitsOfMeasure(error: Fraction, unitOfMeasure: Fraction): Fraction {
	return over(error, unitOfMeasure)
}
