import loadHighs from "highs"
import { type Claim, exactShares, type SharingRule, shareOut } from "~/domain/sharing/share-out"
import { medianOf } from "./timing"

const RULES: readonly SharingRule[] = ["equal-shares", "in-proportion", "equal-shortfall"]
const SIZES = [5_000, 10_000, 20_000]
const SOLVED = 1_000

/** Claims that differ in all that counts, from a fixed sequence, so that every run shares out the same. */
function claimsOf(count: number): Claim[] {
	let state = 12_345
	const next = (below: number) => {
		state = (Math.imul(state, 1_103_515_245) + 12_345) >>> 0
		return (state >>> 8) % below
	}
	const classes = ["commitment", "standing", "single", "single"] as const
	return Array.from({ length: count }, (_, index) => {
		const asked = 1 + next(24)
		return {
			id: `claim-${index}`,
			claimClass: classes[next(4)] ?? "single",
			asked,
			least: next(3) === 0 ? next(asked + 1) : 0,
			weight: [1, 1, 1, 2][next(4)] ?? 1,
			lastPart: next(2) === 0 ? null : next(100) / 100,
			placed: next(1_000_000),
		}
	})
}

/** All claims alike with one least acceptable, and too little for all: thousands are set aside one after the other. */
function alikeClaims(count: number): Claim[] {
	return claimsOf(count).map((claim) => ({ ...claim, claimClass: "single", asked: 20, least: 8, weight: 1 }))
}

const supplyFor = (claims: readonly Claim[]) => Math.floor(claims.reduce((sum, { asked }) => sum + asked, 0) * 0.6)

/**
 * Milliseconds at the median for sharing out by each rule, by number of claims; and for the exact shares of one class
 * without leasts beside HiGHS, which solves the same as a linear programme. Throws where the two differ.
 */
export async function measureSharing() {
	const times = RULES.flatMap((rule) =>
		[
			{ of: "claims of all kinds", make: claimsOf, share: 0 },
			{ of: "claims all alike, most of them set aside", make: alikeClaims, share: 0.35 },
		].map(({ of, make, share }) => ({
			rule,
			of,
			ms: SIZES.map((count) => {
				const claims = make(count)
				const supply = share === 0 ? supplyFor(claims) : Math.floor(count * 20 * share)
				return medianOf(3, () => shareOut({ supply, claims, rule }))
			}),
		})),
	)
	const highs = await loadHighs()
	// HiGHS is given no weights: with them, proportion is not one linear programme.
	const claims = claimsOf(SOLVED).map((claim) => ({ ...claim, weight: 1 }))
	const supply = supplyFor(claims)
	const solved = RULES.map((rule) => {
		const problem = programmeOf(supply, claims, rule)
		const began = performance.now()
		const { Columns: columns } = highs.solve(problem)
		const solverMs = performance.now() - began
		for (const [index, share] of exactShares(supply, claims, rule).entries()) {
			const found = (columns[`x${index}`] as { Primal: number } | undefined)?.Primal ?? Number.NaN
			if (!(Math.abs(found - share) < 1e-4)) throw new Error(`${rule}: HiGHS gives ${found} where we give ${share}`)
		}
		return { rule, ms: medianOf(3, () => exactShares(supply, claims, rule)), solverMs }
	})
	return { sizes: SIZES, times, solved, solvedClaims: SOLVED }
}

/** The least level at which the shares that it bounds sum to the supply: one linear programme for each rule. */
function programmeOf(supply: number, claims: readonly Claim[], rule: SharingRule): string {
	const bound = ({ asked }: Claim, index: number) => {
		if (rule === "equal-shares") return ` b${index}: x${index} - level <= 0`
		if (rule === "in-proportion") return ` b${index}: x${index} - ${asked} level <= 0`
		return ` b${index}: x${index} + level >= ${asked}`
	}
	const sum = claims.map((_, index) => `x${index}`)
	const inLines = Array.from({ length: Math.ceil(sum.length / 20) }, (_, line) =>
		sum.slice(20 * line, 20 * line + 20).join(" + "),
	)
	return [
		"Minimize",
		" obj: level",
		"Subject To",
		` all: ${inLines.join("\n + ")} = ${supply}`,
		...claims.map(bound),
		"Bounds",
		...claims.map(({ asked }, index) => ` 0 <= x${index} <= ${asked}`),
		" level >= 0",
		"End",
	].join("\n")
}
