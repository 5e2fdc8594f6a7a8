import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { combGrams, cutUpLoss, type LotFacts, mergedFacts, mergeRefusal } from "~/domain/lots/regroup"

const lot = (more: Partial<LotFacts> = {}): LotFacts => ({
	productId: "rounds",
	state: "held",
	harvestedOn: "2026-08-01",
	expectedReleaseOn: "2026-08-04",
	bestBeforeOn: "2027-05-28",
	yard: "Home yard",
	grade: "Fancy",
	flora: "clover",
	moistureTenths: 172,
	pfundTenths: null,
	...more,
})

describe("merging lots", () => {
	test("the earliest best before, the latest release and the wettest reading stand", () => {
		const later = lot({ harvestedOn: "2026-08-09", expectedReleaseOn: "2026-08-12", bestBeforeOn: "2027-06-05" })
		expect(mergedFacts([later, lot({ moistureTenths: 181, grade: "No. 1" })])).toMatchObject({
			harvestedOn: "2026-08-01",
			expectedReleaseOn: "2026-08-12",
			bestBeforeOn: "2027-05-28",
			moistureTenths: 181,
			grade: "",
			yard: "Home yard",
		})
	})

	test("a held lot borrows no proof of a released one", () => {
		expect(mergeRefusal([lot(), lot({ state: "released" })])).toMatch(/all held, or all released/)
		expect(mergeRefusal([lot(), lot({ productId: "squares" })])).toMatch(/one product/)
		expect(mergeRefusal([lot(), lot({ grade: "Culls" })])).toMatch(/Culls/)
		expect(mergeRefusal([lot()])).toMatch(/at least one other/)
		expect(mergeRefusal([lot({ state: "withdrawn" }), lot({ state: "withdrawn" })])).toMatch(/withdrawn/)
		expect(mergeRefusal([lot(), lot()])).toBeNull()
	})
})

describe("cutting up", () => {
	test("what goes in is what is made and what is lost, and never less", () => {
		fc.assert(
			fc.property(
				fc.nat(50_000),
				fc.nat(200),
				fc.integer({ min: 1, max: 500 }),
				(gramsIn, piecesMade, combGramsEach) => {
					const loss = cutUpLoss({ gramsIn, piecesMade, combGramsEach })
					if (loss === null) expect(piecesMade * combGramsEach).toBeGreaterThan(gramsIn)
					else expect(loss + piecesMade * combGramsEach).toBe(gramsIn)
				},
			),
		)
	})

	test("half of a jar of chunk honey is comb", () => {
		expect(combGrams({ form: "chunk", pieceNetGrams: 453 })).toBe(227)
		expect(combGrams({ form: "cut-comb", pieceNetGrams: 340 })).toBe(340)
	})
})
