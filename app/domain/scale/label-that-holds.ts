import { allowableVariation } from "./allowable-variation"
import {
	compare,
	exactly,
	type Fraction,
	fraction,
	largest,
	minus,
	over,
	plainDecimal,
	plus,
	rounded,
	times,
	ZERO,
} from "./fraction"
import type { NetContentsWorksheet } from "./net-contents"
import { exactlyIn, type Weight } from "./weight-units"

const QUARTER = exactly("0.25")
/** So many quarters of an ounce below the label are tried: a lot that is a pound short has another trouble. */
const MOST_QUARTERS = 64

function quartersBelow(weight: Fraction): Fraction {
	const nearest = rounded(over(weight, QUARTER), 0)
	const isAbove = compare(times(nearest, QUARTER), weight) >= 0
	return times(isAbove ? minus(nearest, fraction(1n)) : nearest, QUARTER)
}

/**
 * The largest label in quarter ounces under the one that failed, which this sample would have met with an average not below
 * zero and no package beyond the variation: "11¾ oz" as "11.75 oz". Null when every package has its own label, or none
 * holds. A new label still needs a new check.
 */
export function labelThatHolds(sheet: NetContentsWorksheet): string | null {
	if (!sheet.verified) return null
	const { unit } = sheet
	const verified: Weight = { amount: exactly(sheet.verified.weight.amount), unit: sheet.verified.weight.unit }
	const target = exactly(sheet.verified.target)
	const shortest = largest(sheet.packages.map(({ error }) => minus(ZERO, exactly(error))))
	let ounces = quartersBelow(exactlyIn(verified, "oz"))
	for (let tries = 0; tries < MOST_QUARTERS && ounces.top > 0n; tries++, ounces = minus(ounces, QUARTER)) {
		const label: Weight = { amount: ounces, unit: "oz" }
		const lowered = minus(target, exactlyIn(label, unit))
		const variation = allowableVariation(label, unit)
		const averageHolds = compare(plus(exactly(sheet.average), lowered), ZERO) >= 0
		const eachHolds = variation.ok && compare(minus(shortest, lowered), variation.variation) <= 0
		if (averageHolds && eachHolds) return `${plainDecimal(ounces, 2)} oz`
	}
	return null
}
