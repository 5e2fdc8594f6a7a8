import type { Result } from "../result"
import { asNumber, compare, exactly, type Fraction, fraction, over, times } from "./fraction"
import { exactlyIn, type Weight, type WeightUnit } from "./weight-units"

type VariationRow = [toLb: string, toG: number, lb: string, g: string, oz: [top: number, bottom: number]]

/** At or under these, the variation is a tenth of the label. */
const SMALL = { lb: "0.08", g: 36 }

/**
 * Maximum allowable variations for packages labelled by weight: a row holds for labels over the row before and up to and
 * including its own. NIST Handbook 133, Appendix A, Table 2-5, from memory (high); 113 g and 907 g read in 2.2.1 and 2.3.8.2.
 */
const ROWS: readonly VariationRow[] = [
	["0.12", 54, "0.008", "3.6", [1, 8]],
	["0.18", 81, "0.012", "5.4", [3, 16]],
	["0.26", 117, "0.016", "7.2", [1, 4]],
	["0.34", 154, "0.020", "9.0", [5, 16]],
	["0.46", 208, "0.024", "10.8", [3, 8]],
	["0.58", 263, "0.028", "12.7", [7, 16]],
	["0.70", 317, "0.032", "14.5", [1, 2]],
	["0.84", 381, "0.036", "16.3", [9, 16]],
	["0.94", 426, "0.040", "18.1", [5, 8]],
	["1.08", 489, "0.044", "19.9", [11, 16]],
	["1.26", 571, "0.048", "21.7", [3, 4]],
	["1.40", 635, "0.052", "23.5", [13, 16]],
	["1.54", 698, "0.056", "25.4", [7, 8]],
	["1.70", 771, "0.060", "27.2", [15, 16]],
	["1.88", 852, "0.064", "29.0", [1, 1]],
	["2.14", 970, "0.070", "31.7", [9, 8]],
	["2.48", 1120, "0.078", "35.3", [5, 4]],
	["2.76", 1250, "0.086", "39.0", [11, 8]],
	["3.20", 1450, "0.094", "42.6", [3, 2]],
	["3.90", 1760, "0.11", "49", [7, 4]],
	["4.70", 2130, "0.12", "54", [2, 1]],
	["5.80", 2630, "0.14", "63", [9, 4]],
]

/**
 * By how much one package may be short of its label, in `unit`. The row is found in the label's own system (grams, or
 * pounds and ounces), the figure is the one printed for `unit`. Refused above the table at hand (5.80 lb, 2,630 g).
 */
export function allowableVariation(
	label: Weight,
	unit: WeightUnit = label.unit,
): Result<{ variation: Fraction }, { ok: false; reason: "over-the-table" }> {
	const isMetric = label.unit === "g"
	const declared = isMetric ? label.amount : exactlyIn(label, "lb")
	if (compare(declared, exactly(isMetric ? SMALL.g : SMALL.lb)) <= 0)
		return { ok: true, variation: over(exactlyIn(label, unit), fraction(10n)) }
	const row = ROWS.find(([toLb, toG]) => compare(declared, exactly(isMetric ? toG : toLb)) <= 0)
	if (!row) return { ok: false, reason: "over-the-table" }
	const [, , lb, g, [top, bottom]] = row
	const figures = { lb: exactly(lb), g: exactly(g), oz: fraction(BigInt(top), BigInt(bottom)) }
	return { ok: true, variation: figures[unit] }
}

/** The coarsest division a scale may have: a sixth of the variation. Source: NIST Handbook 133 (2026), 2.2.1. */
export function coarsestDivision(variation: Fraction): Fraction {
	return over(variation, fraction(6n))
}

/** The coarsest division that scales are made with (1, 2 or 5 of a decimal place) and that is fine enough. */
export function usualDivision(variation: Fraction): Fraction {
	const most = coarsestDivision(variation)
	const power = Math.floor(Math.log10(asNumber(most)))
	const steps = [power + 1, power, power - 1].flatMap((exponent) =>
		[5n, 2n, 1n].map((step) => times(fraction(step), exactly(`1e${exponent}`))),
	)
	const division = steps.find((step) => compare(step, most) <= 0)
	if (!division) throw new Error("a smaller power of ten is always fine enough")
	return division
}
