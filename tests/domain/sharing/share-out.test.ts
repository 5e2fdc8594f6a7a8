import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { type Claim, type ClaimClass, claimClasses, type SharingRule, shareOut } from "~/domain/sharing/share-out"

const rules = ["equal-shares", "in-proportion", "equal-shortfall"] as const

/** A claim of a single order, the first placed, that takes any number; `given` in the tests below are by id. */
function claim(id: string, asked: number, rest: Partial<Claim> = {}): Claim {
	return { id, claimClass: "single", asked, least: 0, weight: 1, lastPart: null, placed: 1, ...rest }
}

function givenOf(supply: number, claims: readonly Claim[], rule: SharingRule = "equal-shares"): Record<string, number> {
	return Object.fromEntries(shareOut({ supply, claims, rule }).shares.map(({ id, given }) => [id, given]))
}

describe("the three rules in whole cases", () => {
	const claims = [claim("inn", 2), claim("grocer", 8, { placed: 2 }), claim("dairy", 10, { placed: 3 })]

	test("equal shares fill the small claim and share the rest alike", () => {
		expect(givenOf(10, claims)).toEqual({ inn: 2, grocer: 4, dairy: 4 })
	})

	test("in proportion gives each the same part of what it asked", () => {
		expect(givenOf(10, claims, "in-proportion")).toEqual({ inn: 1, grocer: 4, dairy: 5 })
	})

	test("equal shortfall takes the same number of cases from each", () => {
		expect(givenOf(11, claims, "equal-shortfall")).toEqual({ inn: 0, grocer: 5, dairy: 6 })
	})

	test("a heavier weight counts as so many claims under equal shares", () => {
		expect(givenOf(9, [claim("a", 9, { weight: 2 }), claim("b", 9)])).toEqual({ a: 6, b: 3 })
	})
})

describe("left-over cases", () => {
	test("go first to the claim that they lift to its least", () => {
		expect(givenOf(3, [claim("early", 5), claim("late", 5, { placed: 2, least: 2 })])).toEqual({ early: 1, late: 2 })
	})

	test("then to the store that got the smaller part when last short, then to the earlier order", () => {
		const claims = [
			claim("a", 5),
			claim("b", 5, { placed: 2, lastPart: 0.9 }),
			claim("c", 5, { placed: 3, lastPart: 0.4 }),
		]
		expect(givenOf(4, claims)).toEqual({ a: 1, b: 1, c: 2 })
		expect(givenOf(5, claims)).toEqual({ a: 1, b: 2, c: 2 })
	})
})

describe("a claim below its least acceptable", () => {
	test("gets nothing and the rest is shared again", () => {
		const answer = shareOut({
			supply: 6,
			claims: [claim("a", 6, { least: 4 }), claim("b", 6), claim("c", 6)],
			rule: "equal-shares",
		})
		expect(answer.shares.map(({ given, reason }) => [given, reason])).toEqual([
			[0, "below-least"],
			[3, "shared"],
			[3, "shared"],
		])
	})

	test("is set aside one at a time, the furthest below first, so that the other may then be served", () => {
		const claims = [claim("a", 6, { least: 5 }), claim("b", 6, { least: 3 }), claim("c", 2)]
		expect(givenOf(6, claims)).toEqual({ a: 0, b: 4, c: 2 })
	})

	test("is the later order where two are as far below", () => {
		const claims = [claim("late", 4, { least: 3, placed: 9 }), claim("early", 4, { least: 3, placed: 2 })]
		expect(givenOf(4, claims)).toEqual({ late: 0, early: 4 })
	})

	test("comes back when the others fall away too and what is over covers its least", () => {
		const claims = [claim("cafe", 6, { least: 6 }), claim("inn", 20, { least: 11, placed: 2 })]
		const { shares, over } = shareOut({ supply: 10, claims, rule: "in-proportion" })
		expect(shares.map(({ id, given, reason }) => [id, given, reason])).toEqual([
			["cafe", 6, "came-back"],
			["inn", 0, "below-least"],
		])
		expect(over).toBe(4)
	})
})

test("commitments come before standing orders, and those before single orders", () => {
	const claims = [
		claim("single", 5),
		claim("standing", 5, { claimClass: "standing", placed: 2 }),
		claim("commitment", 5, { claimClass: "commitment", placed: 3 }),
	]
	expect(givenOf(7, claims)).toEqual({ commitment: 5, standing: 2, single: 0 })
})

test("nothing to share gives everyone nothing, and no claims leave all of it over", () => {
	expect(givenOf(0, [claim("a", 3), claim("b", 3, { least: 1 })])).toEqual({ a: 0, b: 0 })
	expect(shareOut({ supply: 4, claims: [], rule: "in-proportion" })).toEqual({ shares: [], over: 4 })
})

test("figures that are no cases are refused", () => {
	expect(() => givenOf(1.5, [])).toThrow(RangeError)
	expect(() => givenOf(1, [claim("a", 3, { least: 4 })])).toThrow(RangeError)
	expect(() => givenOf(1, [claim("a", -1)])).toThrow(RangeError)
	expect(() => givenOf(1, [claim("a", 1, { weight: 0 })])).toThrow(RangeError)
	expect(() => givenOf(1, [claim("a", 1), claim("a", 1)])).toThrow(RangeError)
})

/** Claims of a day: least acceptables and weights only where `withLeasts`. */
const anyClaims = ({ withLeasts }: { withLeasts: boolean }) =>
	fc
		.array(
			fc.record({
				claimClass: fc.constantFrom<ClaimClass>(...claimClasses),
				asked: fc.integer({ min: 0, max: 25 }),
				leastShare: withLeasts ? fc.double({ min: 0, max: 1, noNaN: true }) : fc.constant(0),
				weight: withLeasts ? fc.constantFrom(0.5, 1, 1, 1, 2, 3) : fc.constant(1),
				lastPart: fc.option(fc.double({ min: 0, max: 1, noNaN: true }), { nil: null }),
				placed: fc.integer({ min: 0, max: 50 }),
			}),
			{ maxLength: 14 },
		)
		.map((rows) =>
			rows.map(
				({ leastShare, ...row }, index): Claim => ({
					...row,
					id: `claim ${index}`,
					least: Math.floor(leastShare * row.asked),
				}),
			),
		)
const anyRule = fc.constantFrom<SharingRule>(...rules)
const anySupply = fc.integer({ min: 0, max: 200 })
const RUNS = { numRuns: 5000 }

describe("for any claims", () => {
	test("nobody gets more than asked or less than the least, and no case is given twice", () => {
		fc.assert(
			fc.property(anyClaims({ withLeasts: true }), anySupply, anyRule, (claims, supply, rule) => {
				const { shares, over } = shareOut({ supply, claims, rule })
				for (const [index, { given }] of shares.entries()) {
					const { asked, least } = claims[index] as Claim
					expect(given).toBeLessThanOrEqual(asked)
					expect(given === 0 || given >= least).toBe(true)
				}
				expect(shares.reduce((sum, { given }) => sum + given, 0) + over).toBe(supply)
				expect(over).toBeGreaterThanOrEqual(0)
			}),
			RUNS,
		)
	})

	test("what is over covers nobody's least who got nothing", () => {
		fc.assert(
			fc.property(anyClaims({ withLeasts: true }), anySupply, anyRule, (claims, supply, rule) => {
				const { shares, over } = shareOut({ supply, claims, rule })
				const refused = claims.filter((one, index) => shares[index]?.given === 0 && one.asked > 0)
				for (const { least } of refused) expect(over === 0 || over < least).toBe(true)
			}),
			RUNS,
		)
	})

	test("without leasts all the supply is given, or all that is asked", () => {
		fc.assert(
			fc.property(anyClaims({ withLeasts: false }), anySupply, anyRule, (claims, supply, rule) => {
				const asked = claims.reduce((sum, one) => sum + one.asked, 0)
				const given = shareOut({ supply, claims, rule }).shares.reduce((sum, share) => sum + share.given, 0)
				expect(given).toBe(Math.min(supply, asked))
			}),
			RUNS,
		)
	})

	test("a class gets something only when all the classes before it have all they can use", () => {
		fc.assert(
			fc.property(anyClaims({ withLeasts: false }), anySupply, anyRule, (claims, supply, rule) => {
				const { shares } = shareOut({ supply, claims, rule })
				const isShort = (one: Claim, index: number) => (shares[index]?.given ?? 0) < one.asked
				const firstShort = claimClasses.findIndex((name) =>
					claims.some((one, index) => one.claimClass === name && isShort(one, index)),
				)
				const later = claims.filter((one) => firstShort >= 0 && claimClasses.indexOf(one.claimClass) > firstShort)
				for (const one of later) expect(shares[claims.indexOf(one)]?.given).toBe(0)
			}),
			RUNS,
		)
	})

	test("the order of the rows changes nothing", () => {
		fc.assert(
			fc.property(
				anyClaims({ withLeasts: true }).chain((claims) =>
					fc.tuple(fc.constant(claims), fc.shuffledSubarray(claims, { minLength: claims.length })),
				),
				anySupply,
				anyRule,
				([claims, shuffled], supply, rule) => {
					expect(givenOf(supply, shuffled, rule)).toEqual(givenOf(supply, claims, rule))
				},
			),
			RUNS,
		)
	})

	test("under equal shares no case could go from a better-served claim to a worse-served one of its class", () => {
		fc.assert(
			fc.property(anyClaims({ withLeasts: false }), anySupply, (claims, supply) => {
				const { shares } = shareOut({ supply, claims, rule: "equal-shares" })
				for (const [worse, one] of claims.entries()) {
					const given = shares[worse]?.given ?? 0
					if (given >= one.asked) continue
					for (const [better, other] of claims.entries()) {
						if (other.claimClass === one.claimClass) expect((shares[better]?.given ?? 0) - given).toBeLessThanOrEqual(1)
					}
				}
			}),
			RUNS,
		)
	})

	test("under equal shares more supply never gives anyone less", () => {
		fc.assert(
			fc.property(
				anyClaims({ withLeasts: false }),
				anySupply,
				fc.integer({ min: 1, max: 9 }),
				(claims, supply, more) => {
					const before = givenOf(supply, claims)
					const after = givenOf(supply + more, claims)
					for (const { id } of claims) expect(after[id]).toBeGreaterThanOrEqual(before[id] as number)
				},
			),
			RUNS,
		)
	})
})
