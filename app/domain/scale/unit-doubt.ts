import { asNumber, exactly } from "./fraction"
import { exactlyIn, type Weight, type WeightUnit, weightUnits } from "./weight-units"

/** A full package weighs between this and that many times its label: boxes and jars included. */
const LIKELY = [0.7, 2.2] as const

const isLikely = (times: number) => times >= LIKELY[0] && times <= LIKELY[1]

/** What does not look right: all weights in another unit, or single weights far from the label, by their places. */
export type WeightDoubt =
	| { kind: "unit"; times: number; likely: WeightUnit }
	| { kind: "packages"; places: number[] }
	| null

/**
 * Whether weights in `unit` can be of packages with this label. Weights that would be right in another unit (all about
 * 28.35, 453.6 or 16 times off) are told with that unit; single ones under 0.7 or over 2.2 times the label by their
 * places. Nothing is changed: a person is asked.
 */
export function weightDoubt(weights: readonly string[], unit: WeightUnit, label: Weight): WeightDoubt {
	const labelled = asNumber(exactlyIn(label, unit))
	const ratios = weights.map((weight) => asNumber(exactly(weight)) / labelled)
	const middle = ratios.toSorted((a, b) => a - b)[Math.floor(ratios.length / 2)] ?? 1
	if (!isLikely(middle)) {
		const likely = weightUnits.find((other) => {
			const factor = asNumber(exactlyIn({ amount: exactly(1), unit: other }, unit))
			return other !== unit && isLikely(middle * factor)
		})
		if (likely) return { kind: "unit", times: middle, likely }
	}
	const places = ratios.flatMap((ratio, place) => (isLikely(ratio) ? [] : [place]))
	return places.length > 0 ? { kind: "packages", places } : null
}
