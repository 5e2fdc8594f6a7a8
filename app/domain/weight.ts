const GRAMS_PER_OUNCE = 28.349523125
const GRAMS_PER_QUARTER_OUNCE = GRAMS_PER_OUNCE / 4
const QUARTERS = ["", "¼", "½", "¾"] as const

function requireGrams(grams: number): void {
	if (!Number.isSafeInteger(grams) || grams < 0) throw new RangeError(`not a whole weight: ${grams}`)
}

function ouncesText(quarterOunces: number): string {
	const whole = Math.floor(quarterOunces / 4)
	const quarter = QUARTERS[quarterOunces % 4] as string
	return `${whole === 0 && quarter !== "" ? "" : whole}${quarter} oz`
}

function poundsText(quarterOunces: number): string {
	const pounds = Math.floor(quarterOunces / 64)
	const rest = quarterOunces % 64
	if (pounds === 0) return ouncesText(rest)
	return rest === 0 ? `${pounds} lb` : `${pounds} lb ${ouncesText(rest)}`
}

/**
 * A weight in pounds and ounces to the nearest whole ounce: "6 lb", "9 lb 12 oz", "8 oz".
 * Throws RangeError on a negative or fractional number of grams.
 */
export function weightWords(grams: number): string {
	requireGrams(grams)
	return poundsText(Math.round(grams / GRAMS_PER_OUNCE) * 4)
}

/** A weight that was weighed, in both units: "9 lb 12 oz (4,422 g)". Throws RangeError on a negative or fractional number of grams. */
export function exactWeightWords(grams: number): string {
	return `${poundsText(Math.round((grams * 4) / GRAMS_PER_OUNCE))} (${grams.toLocaleString("en-US")} g)`
}

/**
 * The whole grams to store and print for a label of `ounces` (quarters at the finest), rounded down, so that the ounces
 * stay the larger declaration and the one that is verified: 12 oz is 340 g. Throws RangeError on anything but quarters.
 * Source: NIST Handbook 133, 2.3.3.1 (published values "labelling", declarations).
 */
export function labelledGrams(ounces: number): number {
	if (!Number.isSafeInteger(ounces * 4) || ounces <= 0) throw new RangeError(`not a labelled weight: ${ounces}`)
	return Math.floor(ounces * GRAMS_PER_OUNCE)
}

function labelledQuarterOunces(grams: number): number {
	requireGrams(grams)
	return Math.round(grams / GRAMS_PER_QUARTER_OUNCE)
}

/** The ounces a label of `grams` stands for, to the quarter: 340 g is "12 oz", 191 g "6¾ oz". */
export function labelledOunces(grams: number): string {
	return ouncesText(labelledQuarterOunces(grams))
}

/**
 * What pieces weigh together by their labels: "31 lb 8 oz". Each label is read back as its ounces before it is multiplied,
 * so that the grams lost on each label do not add up over the cases. Throws RangeError on a negative or fractional input.
 */
export function labelledTotalWords(lines: readonly { labelledGrams: number; pieces: number }[]): string {
	const total = lines.reduce((sum, line) => {
		requireGrams(line.pieces)
		return sum + labelledQuarterOunces(line.labelledGrams) * line.pieces
	}, 0)
	return poundsText(total)
}
