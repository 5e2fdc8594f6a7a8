import fc from "fast-check"
import { expect, test } from "vitest"
import { places } from "~/domain/stock/places"
import { balanceOf, drillFaults } from "~/domain/trace/balance"
import { HONEY_KEEP_MONTHS, keepMonths, keepUntil, mayBeCleared } from "~/domain/trace/retention"

test("whatever lies where, the columns of a balance add up to the places", () => {
	const balances = fc.array(fc.record({ place: fc.constantFrom(...places), pieces: fc.nat(5_000) }), { maxLength: 30 })
	fc.assert(
		fc.property(balances, (balances) => {
			const placed = balances.reduce((sum, { pieces }) => sum + pieces, 0)
			const balance = balanceOf(placed, balances)
			const { out, inHand, waste, cutUp, otherLots, missing } = balance
			expect(out + inHand + waste + cutUp + otherLots + missing).toBe(placed)
			expect(balance.isBalanced).toBe(true)
			expect(balanceOf(placed + 1, balances).isBalanced).toBe(false)
		}),
	)
})

test("what is packed, on the van or on the market table is still in hand; only what is sold is out", () => {
	const balance = balanceOf(100, [
		{ place: "packed", pieces: 24 },
		{ place: "van", pieces: 12 },
		{ place: "market", pieces: 4 },
		{ place: "sold", pieces: 60 },
	])
	expect(balance).toMatchObject({ inHand: 40, out: 60, isBalanced: true })
})

test("a drill says in words what does not add up, and nothing when all does", () => {
	const balance = balanceOf(48, [
		{ place: "sold", pieces: 36 },
		{ place: "other-lot", pieces: 12 },
	])
	expect(drillFaults("R1", { ...balance, namedPieces: 36, linkedPieces: 12 })).toEqual([])
	expect(drillFaults("R1", { ...balance, namedPieces: 40, linkedPieces: 12 })).toEqual([])
	expect(drillFaults("R1", { ...balance, harvested: 50, isBalanced: false, namedPieces: 24, linkedPieces: 0 })).toEqual(
		[
			"Lot R1: 50 pieces were harvested and 48 are accounted for.",
			"Lot R1: 12 sold pieces have no order and no market day.",
			"Lot R1: of 12 pieces that went into other lots, 0 are found there.",
		],
	)
})

test("a record of honey is kept for two years to the day, also over a leap day", () => {
	expect(keepUntil("2026-08-18", HONEY_KEEP_MONTHS)).toBe("2028-08-18")
	expect(keepUntil("2024-02-29", 24)).toBe("2026-02-28")
	expect(keepUntil("2025-08-31", 6)).toBe("2026-02-28")
	expect(mayBeCleared("2026-08-18", "2028-08-18")).toBe(false)
	expect(mayBeCleared("2026-08-18", "2028-08-19")).toBe(true)
})

test("the period follows the day on which the food loses its value", () => {
	expect(keepMonths("2026-07-01", "2026-08-30")).toBe(6)
	expect(keepMonths("2026-07-01", "2026-08-31")).toBe(12)
	expect(keepMonths("2026-07-01", "2027-01-01")).toBe(12)
	expect(keepMonths("2026-07-01", "2027-01-02")).toBe(24)
	expect(() => keepMonths("2026-02-30", "2027-01-02")).toThrow(RangeError)
})
