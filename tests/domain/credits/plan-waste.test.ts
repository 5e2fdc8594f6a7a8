import fc from "fast-check"
import { expect, test } from "vitest"
import { answerState, reportableUntil } from "~/domain/credits/breakage-window"
import { planWaste, type SentLot } from "~/domain/credits/plan-waste"

const early = { lineId: "line", lotId: "early", orderId: "order", pieces: 7, sold: 7 }
const late = { lineId: "line", lotId: "late", orderId: "order", pieces: 5, sold: 5 }

test("broken pieces come from the first lot that filled the line, then from the next", () => {
	expect(planWaste([{ lineId: "line", pieces: 9 }], [early, late])).toEqual({
		moves: [
			{ lotId: "early", orderId: "order", pieces: 7 },
			{ lotId: "late", orderId: "order", pieces: 2 },
		],
		missing: 0,
	})
})

test("what was written off before is not written off again, and what is not there is said", () => {
	expect(
		planWaste(
			[{ lineId: "line", pieces: 4 }],
			[
				{ ...early, sold: 0 },
				{ ...late, sold: 3 },
			],
		),
	).toEqual({
		moves: [{ lotId: "late", orderId: "order", pieces: 3 }],
		missing: 1,
	})
	expect(planWaste([{ lineId: "line of an old invoice", pieces: 2 }], [])).toEqual({ moves: [], missing: 2 })
})

test("nothing is ever taken that a lot has not sold with the order, and no piece is lost from the count", () => {
	const lots = fc.array(
		fc.record({
			lineId: fc.constantFrom("a", "b"),
			lotId: fc.constantFrom("x", "y", "z"),
			orderId: fc.constantFrom("o", "p"),
			pieces: fc.integer({ min: 1, max: 40 }),
		}),
		{ maxLength: 8 },
	)
	const broken = fc.array(fc.record({ lineId: fc.constantFrom("a", "b"), pieces: fc.nat(60) }), { maxLength: 4 })
	fc.assert(
		fc.property(lots, broken, fc.func(fc.nat(50)), (given, wanted, soldOf) => {
			const sent: SentLot[] = given.map((lot) => ({ ...lot, sold: soldOf(lot.lotId, lot.orderId) }))
			const { moves, missing } = planWaste(wanted, sent)
			for (const { lotId, orderId, pieces } of moves) {
				expect(pieces).toBeGreaterThan(0)
				expect(pieces).toBeLessThanOrEqual(soldOf(lotId, orderId))
			}
			const moved = moves.reduce((sum, { pieces }) => sum + pieces, 0)
			expect(moved + missing).toBe(wanted.reduce((sum, { pieces }) => sum + pieces, 0))
		}),
	)
})

test("comb can be reported through the last of the producer's days after its delivery", () => {
	expect(reportableUntil("2026-08-30", 3)).toBe("2026-09-02")
	expect(reportableUntil("2026-08-18", 0)).toBe("2026-08-18")
})

test("an answer is whole, a part or a no by its pieces", () => {
	expect(answerState([{ pieces: 3, acceptedPieces: 3 }])).toBe("accepted")
	expect(
		answerState([
			{ pieces: 3, acceptedPieces: 3 },
			{ pieces: 1, acceptedPieces: 0 },
		]),
	).toBe("part-accepted")
	expect(answerState([{ pieces: 3, acceptedPieces: 0 }])).toBe("declined")
})
