import { type Fraction, fraction, minus, over, plus, rounded, times } from "./fraction"

/**
 * Allowances for moisture lost after packing that the handbook sets beforehand, in tenths of a percent of the label; null
 * where a test of its own stands instead. Honey is not among them: it is judged without an allowance, and whether one
 * might be granted is left to the local authority. Source: NIST Handbook 133 (2026), Table 2-3 and 2.3.8.
 */
const ALLOWANCE_TENTHS: Readonly<Record<string, number | null>> = {
	flour: 30,
	"dry pet food": 30,
	pasta: 30,
	borax: null,
	"cannabis plant material": 30,
	"fresh poultry": 30,
	franks: 25,
}

/** Whether the handbook lists the food, and the allowance it sets, in percent. */
export function moistureListing(food: string): { isListed: boolean; percent: number | null } {
	const tenths = ALLOWANCE_TENTHS[food]
	return { isListed: tenths !== undefined, percent: tenths == null ? null : tenths / 10 }
}

/** `percent` of the label, rounded to the place the handbook weighs to: 3 % of 907 g is 27 g. */
export function moistureAllowance(label: Fraction, percent: Fraction, places = 0): Fraction {
	return rounded(over(times(label, percent), fraction(100n)), places)
}

/** The allowance used before weighing: the nominal gross weight is lowered, the variation stays. */
export function lessAllowance(nominalGross: Fraction, allowance: Fraction): Fraction {
	return minus(nominalGross, allowance)
}

/** The allowance used afterwards, on the sample error limit and on the variation; never both ways at once. */
export function moreAllowance(limit: Fraction, allowance: Fraction): Fraction {
	return plus(limit, allowance)
}
