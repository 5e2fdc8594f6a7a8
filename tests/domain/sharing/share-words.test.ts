import { describe, expect, test } from "vitest"
import { type Claim, type SharingRule, shareOut } from "~/domain/sharing/share-out"
import { deskReason, ruleSentence, storeSentence, type ToldSharing, verdictOf } from "~/domain/sharing/share-words"

/** Nine stores and eighteen cases: name, asked, least, and what it had of what it asked when last short. */
const STORES: [name: string, asked: number, least: number, last: [given: number, asked: number] | null][] = [
	["Mill Lane Co-op", 8, 2, [7, 8]],
	["Green Ladle Grocers", 6, 3, [3, 6]],
	["Pantry & Plume", 4, 2, [2, 4]],
	["Corner Larder", 3, 2, [3, 3]],
	["Hobday’s Wholefoods", 3, 1, [1, 3]],
	["Thistle & Rye", 2, 1, [2, 2]],
	["The Copper Churn", 2, 1, [1, 2]],
	["Weir Street Pantry", 2, 2, null],
	["Saltmarsh Provisions", 1, 1, [1, 1]],
]
const NAMES = STORES.map(([name]) => name)
const CLAIMS = STORES.map(
	([id, asked, least, last], placed): Claim => ({
		id,
		asked,
		least,
		placed,
		claimClass: "single",
		weight: 1,
		lastPart: last && last[0] / last[1],
	}),
)

function tell(rule: SharingRule, supply = 18, claims: readonly Claim[] = CLAIMS): ToldSharing {
	return { supply, rule, claims, shares: shareOut({ supply, claims, rule }).shares }
}
const reasonsOf = (told: ToldSharing) =>
	STORES.map(([, , , last], index) => deskReason(told, index, last && { given: last[0], asked: last[1] }))
const givenOf = (told: ToldSharing) => told.shares.map(({ given }) => given)
const readsOf = (told: ToldSharing, index: number, byHand: string | null = null) =>
	storeSentence(told, index, {
		asked: told.claims[index]?.asked ?? 0,
		given: told.shares[index]?.given ?? 0,
		sure: 0,
		byHand,
	})

describe("eighteen cases that nine stores want", () => {
	test("shared equally: each reads why", () => {
		const told = tell("equal-shares")
		expect(givenOf(told)).toEqual([2, 3, 2, 2, 2, 2, 2, 2, 1])
		expect(reasonsOf(told)).toEqual([
			"Its share is 2.2. Had 7 of 8 when last short.",
			"The 18th case: without it, under its least.",
			"Its share is 2.2. Had 2 of 4 when last short.",
			"Its share is 2.2. Had 3 of 3 when last short.",
			"Its share is 2.2. Had 1 of 3 when last short.",
			"Asked 2, gets 2.",
			"Asked 2, gets 2.",
			"Takes 2 or none.",
			"Asked 1, gets 1.",
		])
		expect(verdictOf(told, NAMES)).toEqual({
			isGood: true,
			head: "All nine reach their least.",
			line: "18 of 18 cases given.",
		})
	})

	test("shared equally: the store reads its own figures and the rule", () => {
		const told = tell("equal-shares")
		expect(readsOf(told, 2)).toBe("You asked 4 and get 2. We gave one case each until the 18 were gone.")
		expect(readsOf(told, 5)).toBe("You asked 2 and get all 2.")
		expect(readsOf(told, 8)).toBe("You asked 1 and get it.")
		expect(readsOf(told, 2, "You had more in July")).toBe(
			"You asked 4 and get 2. We set this by hand: You had more in July.",
		)
	})

	test("with an equal shortfall: who would get less than the least is set aside, and both sides read so", () => {
		const told = tell("equal-shortfall")
		expect(told.shares[7]).toMatchObject({ given: 0, reason: "below-least" })
		expect(reasonsOf(told)[7]).toBe("Takes 2 or none. Its share would be 0.5.")
		expect(readsOf(told, 7)).toBe(
			"You asked 2 and get none this time. You take 2 or none, and your share of the 18 would have been less.",
		)
		expect(verdictOf(told, NAMES)).toEqual({
			isGood: false,
			head: "Two are set aside: under their least.",
			line: "Weir Street Pantry and Saltmarsh Provisions get none. 18 of 18 cases given.",
		})
	})

	test("each rule says in a sentence what it does", () => {
		const anyNumber = CLAIMS.map((claim) => ({ ...claim, least: 0 }))
		expect(ruleSentence(tell("equal-shares", 18, anyNumber))).toBe(
			"One case each, round by round, until they are gone.",
		)
		expect(ruleSentence(tell("in-proportion", 18, anyNumber))).toBe(
			"Everyone gets the same part of what they asked: 58%.",
		)
		expect(ruleSentence(tell("equal-shortfall", 18, anyNumber))).toBe(
			"Everyone goes without the same number: one or two.",
		)
	})
})

test("with no case at all the verdict and every store's sentence say so", () => {
	const told = tell("equal-shares", 0)
	expect(verdictOf(told, NAMES)).toEqual({ isGood: false, head: "None can be ready.", line: "Everyone gets none." })
	expect(readsOf(told, 0)).toMatch(/^You asked 8 and get none this time\. /)
})

test("a single order reads that commitments and standing orders came first", () => {
	const [first, second, third] = CLAIMS as [Claim, Claim, Claim]
	const told = tell("equal-shares", 15, [
		{ ...first, claimClass: "commitment" },
		{ ...second, claimClass: "standing" },
		{ ...third, least: 0 },
	])
	expect(givenOf(told)).toEqual([8, 6, 1])
	expect(readsOf(told, 2)).toBe(
		"You asked 4 and get 1. Commitments made before the season and standing orders came first. We gave one case each until the 15 were gone.",
	)
})

test("what was sure already is said apart", () => {
	const told = tell("equal-shares")
	expect(storeSentence(told, 2, { asked: 6, given: 4, sure: 2, byHand: null })).toBe(
		"You asked 6 and get 4. 2 of them were yours already. We gave one case each until the 18 were gone.",
	)
})

test("no sentence for a store holds the name of any store", () => {
	for (const rule of ["equal-shares", "in-proportion", "equal-shortfall"] as const) {
		const told = tell(rule)
		for (const [index] of STORES.entries()) for (const name of NAMES) expect(readsOf(told, index)).not.toContain(name)
	}
})
