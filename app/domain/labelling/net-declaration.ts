import { decimalText, exactly, plainDecimal } from "../scale/fraction"
import { labelledGrams } from "../weight"

const OUNCES_PER_POUND = 16
/** From here pounds stand first. */
const POUNDS_FIRST = 64
const GRAMS_PER_KILOGRAM = 1000

function poundsAndOunces(ounces: number): string {
	const pounds = Math.floor(ounces / OUNCES_PER_POUND)
	const rest = ounces - pounds * OUNCES_PER_POUND
	return rest === 0 ? `${pounds} LB` : `${pounds} LB ${rest} OZ`
}

/** Grams under a kilogram, then kilograms with three figures at the most, always rounded down. */
function metricWords(ounces: number): string {
	const grams = labelledGrams(ounces)
	if (grams < GRAMS_PER_KILOGRAM) return `${grams} g`
	const hundredths = Math.floor(grams / 10)
	return `${plainDecimal(exactly(`${hundredths}e-2`), 2)} kg`
}

/**
 * The net weight as it stands on a label: "NET WT 12 OZ (340 g)"; from a pound to under four, ounces first and then pounds
 * in parentheses: "NET WT 24 OZ (1 LB 8 OZ) 680 g"; from four pounds, pounds first. The metric figure is rounded down, so
 * that the ounces stay what is verified. Ounces in quarters; throws RangeError on anything else.
 * Source: 21 CFR 101.7(j), (m) (form from memory, high); 15 U.S.C. 1453(a)(2); NIST Handbook 133 (2026), 2.3.3.1.
 */
export function netDeclaration(ounces: number): string {
	const metric = metricWords(ounces)
	if (ounces < OUNCES_PER_POUND) return `NET WT ${ounces} OZ (${metric})`
	if (ounces < POUNDS_FIRST) return `NET WT ${ounces} OZ (${poundsAndOunces(ounces)}) ${metric}`
	return `NET WT ${poundsAndOunces(ounces)} (${metric})`
}

/** Decimals of a pound on a label of random weight: two meet both 15 U.S.C. 1453 (three) and 21 CFR 101.7(j)(2) (two). */
export const RANDOM_WEIGHT_DECIMALS = 2

/** The net weight of one package of random weight, rounded down to hundredths of a pound: "0.75 lb". */
export function randomWeightWords(thousandthsOfPound: number): string {
	if (!Number.isSafeInteger(thousandthsOfPound) || thousandthsOfPound < 0) throw new RangeError("not a weight")
	return `${decimalText(exactly(`${Math.floor(thousandthsOfPound / 10)}e-2`), RANDOM_WEIGHT_DECIMALS)} lb`
}
