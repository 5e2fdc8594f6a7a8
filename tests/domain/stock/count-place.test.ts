import fc from "fast-check"
import { expect, test } from "vitest"
import { movesOfCount } from "~/domain/stock/count-place"
import { handTargets, mayMoveByHand } from "~/domain/stock/hand-moves"
import { places } from "~/domain/stock/places"

test("what was counted as the ledger has it moves nothing", () => {
	expect(movesOfCount("ready", [{ lotId: "R1", counted: 24, ledger: 24, missing: 3 }])).toEqual([])
})

test("what was not found is missing", () => {
	expect(movesOfCount("cold-room", [{ lotId: "R1", counted: 22, ledger: 24, missing: 0 }])).toEqual([
		{ lotId: "R1", from: "cold-room", to: "missing", pieces: 2 },
	])
})

test("more than the ledger has is found again first, and only what is over was never written down", () => {
	expect(movesOfCount("market", [{ lotId: "R1", counted: 29, ledger: 24, missing: 3 }])).toEqual([
		{ lotId: "R1", from: "missing", to: "market", pieces: 3 },
		{ lotId: "R1", from: null, to: "market", pieces: 2 },
	])
	expect(movesOfCount("ready", [{ lotId: "R1", counted: 26, ledger: 24, missing: 3 }])).toEqual([
		{ lotId: "R1", from: "missing", to: "ready", pieces: 2 },
	])
})

test("part of a piece throws", () => {
	expect(() => movesOfCount("ready", [{ lotId: "R1", counted: 1.5, ledger: 24, missing: 0 }])).toThrow(RangeError)
})

test("after any count the ledger has what was counted, and nothing is below zero", () => {
	const lot = fc.record({ counted: fc.nat(60), ledger: fc.nat(60), missing: fc.nat(9) })
	fc.assert(
		fc.property(lot, (facts) => {
			const at = { ready: facts.ledger, missing: facts.missing, hives: 100 }
			for (const { from, to, pieces } of movesOfCount("ready", [{ lotId: "R1", ...facts }])) {
				expect(pieces).toBeGreaterThan(0)
				at[from === "missing" || from === "ready" ? from : "hives"] -= pieces
				at[to === "missing" ? "missing" : "ready"] += pieces
			}
			expect(at.ready).toBe(facts.counted)
			expect(at.missing).toBeGreaterThanOrEqual(0)
			expect(at.ready + at.missing + at.hives).toBe(facts.ledger + facts.missing + 100)
		}),
	)
})

test("a hand moves what lies on shelves or a market's table, and never what belongs to an order", () => {
	expect(handTargets.filter((to) => mayMoveByHand("ready", to))).toEqual(["cold-room", "waste", "missing"])
	expect(handTargets.filter((to) => mayMoveByHand("market", to))).toEqual(["ready", "waste", "missing"])
	for (const from of ["packed", "van", "sold", "waste", "cut-up", "other-lot"] as const) {
		expect(places.filter((to) => mayMoveByHand(from, to))).toEqual([])
	}
})
