import { describe, expect, test } from "vitest"
import { splitByLargestRemainder } from "~/domain/money"
import type { PublishedValues } from "./published-values"

/** Weights as whole numbers in the same proportion: decimals are moved until none is left. */
function wholeWeights(weights: readonly number[]): number[] {
	const places = Math.max(...weights.map((weight) => String(weight).split(".")[1]?.length ?? 0))
	return weights.map((weight) => Math.round(weight * 10 ** places))
}

/** Makes one test of each split by largest remainder. */
export function holdAllocation({ allocation }: PublishedValues): void {
	const examples = allocation?.largest_remainder ?? []

	if (examples.length > 0) {
		describe("largest remainder", () => {
			test.each(examples)("$id: $total over $weights", ({ total, weights, result }) => {
				expect(splitByLargestRemainder(total, wholeWeights(weights))).toEqual(result)
			})
		})
	}
}
