import { expect, test } from "vitest"
import { exactShares } from "~/domain/sharing/share-out"
import { equalAwardsBySolver } from "./sharing-solver"
import { repeatable } from "./solver"

test("on 5,000 random cases equal awards without rounding are those of a linear programme", () => {
	const random = repeatable(20260818)
	let short = 0
	for (let run = 0; run < 5000; run += 1) {
		const claims = Array.from({ length: 1 + random(8) }, () => ({
			asked: 1 + random(25),
			weight: [0.5, 1, 1, 1, 2, 3][random(6)] as number,
		}))
		const supply = random(100)
		const ours = exactShares(supply, claims, "equal-shares")
		const theirs = equalAwardsBySolver(supply, claims)
		for (const [index, share] of ours.entries()) expect(share).toBeCloseTo(theirs[index] as number, 5)
		if (claims.reduce((sum, { asked }) => sum + asked, 0) > supply) short += 1
	}
	// Short and plenty must both be among them, or the comparison says little.
	expect(short).toBeGreaterThan(1000)
	expect(short).toBeLessThan(4500)
}, 120_000)
