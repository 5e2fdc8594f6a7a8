import { describe, expect, test } from "vitest"
import { splitByLargestRemainder } from "~/domain/money"
import { exactShares } from "~/domain/sharing/share-out"
import type { PublishedValues } from "./published-values"

/** Weights as whole numbers in the same proportion: decimals are moved until none is left. */
function wholeWeights(weights: readonly number[]): number[] {
	const places = Math.max(...weights.map((weight) => String(weight).split(".")[1]?.length ?? 0))
	return weights.map((weight) => Math.round(weight * 10 ** places))
}

/** The columns of the published tables, and the rule of the product that each is of. */
const RULES = [
	["proportional", "in-proportion"],
	["constrained_equal_awards", "equal-shares"],
	["constrained_equal_losses", "equal-shortfall"],
] as const

/**
 * Up to half of all claims, equal awards over the halves; beyond, the other half and equal losses over it.
 * Source: Aumann and Maschler, Journal of Economic Theory 36 (1985).
 */
function halvesRule(estate: number, claims: readonly number[]): number[] {
	const halves = claims.map((claim) => ({ asked: claim / 2, weight: 1 }))
	const half = halves.reduce((sum, { asked }) => sum + asked, 0)
	if (estate <= half) return exactShares(estate, halves, "equal-shares")
	const beyond = exactShares(estate - half, halves, "equal-shortfall")
	return halves.map(({ asked }, index) => asked + (beyond[index] ?? 0))
}

/** Makes one test of each column of a table of the claims problem, and of each split by largest remainder. */
export function holdAllocation({ allocation }: PublishedValues): void {
	const examples = allocation?.largest_remainder ?? []
	const ofTalmud = (allocation?.tables ?? []).flatMap(({ talmud, ...table }) => (talmud ? [{ ...table, talmud }] : []))
	const columns = (allocation?.tables ?? []).flatMap((table) =>
		RULES.flatMap(([column, rule]) => {
			const shares = table[column]
			return shares ? [{ ...table, column, rule, shares }] : []
		}),
	)

	if (columns.length > 0) {
		describe("claims on an estate", () => {
			test.each(columns)("$column of $estate over $claims", ({ estate, claims, rule, shares }) => {
				const ours = exactShares(
					estate,
					claims.map((asked) => ({ asked, weight: 1 })),
					rule,
				)
				expect(ours).toHaveLength(shares.length)
				for (const [index, { decimal }] of shares.entries()) expect(ours[index]).toBeCloseTo(decimal, 5)
			})
		})
	}

	if (ofTalmud.length > 0) {
		describe("the bankruptcies of the Talmud, from two rules of the product on half of each claim", () => {
			test.each(ofTalmud)("talmud of $estate over $claims", ({ estate, claims, talmud }) => {
				const ours = halvesRule(estate, claims)
				expect(ours).toHaveLength(talmud.length)
				for (const [index, { decimal }] of talmud.entries()) expect(ours[index]).toBeCloseTo(decimal, 5)
			})
		})
	}

	if (examples.length > 0) {
		describe("largest remainder", () => {
			test.each(examples)("$id: $total over $weights", ({ total, weights, result }) => {
				expect(splitByLargestRemainder(total, wholeWeights(weights))).toEqual(result)
			})
		})
	}
}
