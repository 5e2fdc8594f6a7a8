import { compare, type Fraction } from "../scale/fraction"
import { type Weight, weightIn } from "../scale/weight-units"

/** What is verified: one of the two declarations, and what each comes to in grams, to six figures. */
export type VerifiedDeclaration = {
	verified: "inch-pound" | "metric"
	weight: Weight
	inchPoundGrams: Fraction | null
	metricGrams: Fraction | null
	/** Rounding the grams up has made them the larger, which raises what must be in the package. */
	isRaised: boolean
}

/**
 * Which declaration of a label is verified: the larger, when both are there; the inch-pound one when they are equal.
 * "12 oz, 340 g" is held to 12 oz, "8 oz, 227 g" to 227 g. Throws RangeError when there is neither.
 * Source: NIST Handbook 133 (2026), 2.3.3.1.
 */
export function verifiedDeclaration(label: { inchPound: Weight | null; metric: Weight | null }): VerifiedDeclaration {
	const { inchPound, metric } = label
	const inchPoundGrams = inchPound && weightIn(inchPound, "g")
	const metricGrams = metric && weightIn(metric, "g")
	const isRaised = Boolean(inchPoundGrams && metricGrams && compare(metricGrams, inchPoundGrams) > 0)
	const weight = isRaised ? metric : (inchPound ?? metric)
	if (!weight) throw new RangeError("a label declares a weight")
	return { verified: weight.unit === "g" ? "metric" : "inch-pound", weight, inchPoundGrams, metricGrams, isRaised }
}
