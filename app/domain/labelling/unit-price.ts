import { compare, decimalText, exactly, type Fraction, fraction, over, times } from "../scale/fraction"

const CENTS_PER_DOLLAR = 100n

/** The price of an ounce in cents, exactly. Throws RangeError on a price below zero or no weight. */
export function centsPerOunce(priceCents: number, netOunces: number | string): Fraction {
	const ounces = exactly(netOunces)
	if (!Number.isSafeInteger(priceCents) || priceCents < 0 || ounces.top <= 0n) {
		throw new RangeError(`not a price or a weight: ${priceCents}, ${netOunces}`)
	}
	return over(fraction(BigInt(priceCents)), ounces)
}

/** The price of a pound in cents, exactly. */
export function centsPerPound(priceCents: number, netOunces: number | string): Fraction {
	return times(centsPerOunce(priceCents, netOunces), fraction(16n))
}

/**
 * A unit price as it is shown: from a dollar to the nearest cent ("$13.32"), under a dollar to the tenth of a cent or to the
 * cent, one of them throughout ("83.3¢", "83¢"); a half goes up.
 * Source: NIST Handbook 130, Uniform Unit Pricing Regulation (rounding from memory, high); it is a model, and states differ.
 */
export function unitPriceWords(cents: Fraction, underADollar: "tenth" | "whole" = "tenth"): string {
	const dollar = fraction(CENTS_PER_DOLLAR)
	if (compare(cents, dollar) >= 0) return `$${decimalText(over(cents, dollar), 2)}`
	return `${decimalText(cents, underADollar === "tenth" ? 1 : 0)}¢`
}
