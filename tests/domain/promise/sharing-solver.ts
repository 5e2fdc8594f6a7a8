import loadHighs from "highs"

const highs = await loadHighs()

/**
 * Equal awards of `supply` among claims with weights, found by a general solver that knows nothing of levels: rounds of a
 * linear programme that raises the smallest award per weight as far as it goes. After each round the claims that cannot
 * rise any further are fixed, and the rest goes on. Claims above 0; shares in their order. Source of the method: max–min
 * fairness by lexicographic rounds, as in Bertsekas and Gallager, Data Networks (1992), 6.5 (from memory).
 */
export function equalAwardsBySolver(supply: number, claims: readonly { asked: number; weight: number }[]): number[] {
	const fixed = new Map<number, number>()
	while (fixed.size < claims.length) {
		const level = highestLevel(supply, claims, fixed)
		const open = [...claims.keys()].filter((index) => !fixed.has(index))
		const filled = open.filter((index) => askedOf(claims, index) <= level * weightOf(claims, index) + 1e-7)
		// Nobody is filled at the highest level: the supply ends there, and all that are open stay at it.
		for (const index of filled.length > 0 ? filled : open)
			fixed.set(index, filled.length > 0 ? askedOf(claims, index) : level * weightOf(claims, index))
	}
	return [...claims.keys()].map((index) => fixed.get(index) as number)
}

const askedOf = (claims: readonly { asked: number }[], index: number) => (claims[index] as { asked: number }).asked
const weightOf = (claims: readonly { weight: number }[], index: number) => (claims[index] as { weight: number }).weight

/** The highest level that every open claim can have, where an open claim that is filled below it counts as filled. */
function highestLevel(
	supply: number,
	claims: readonly { asked: number; weight: number }[],
	fixed: ReadonlyMap<number, number>,
): number {
	const open = [...claims.keys()].filter((index) => !fixed.has(index))
	const smallest = Math.min(...open.map((index) => askedOf(claims, index) / weightOf(claims, index)))
	const used = [...fixed.values()].reduce((sum, share) => sum + share, 0)
	const programme = [
		"Maximize",
		" obj: t",
		"Subject To",
		...open.map((index) => ` at${index}: x${index} - ${weightOf(claims, index)} t >= 0`),
		` all: ${open.map((index) => `x${index}`).join(" + ")} <= ${Math.max(0, supply - used)}`,
		"Bounds",
		` 0 <= t <= ${smallest}`,
		...open.map((index) => ` 0 <= x${index} <= ${askedOf(claims, index)}`),
		"End",
	].join("\n")
	const solved = highs.solve(programme, { output_flag: false })
	if (solved.Status !== "Optimal") throw new Error(`the solver says ${solved.Status}`)
	return Number(solved.Columns.t?.Primal ?? 0)
}
