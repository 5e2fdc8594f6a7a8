import fc from "fast-check"
import { expect, test } from "vitest"
import { harvestedPieces, soldPercent, wholePercent } from "~/domain/figures/shares"
import { fillSpans, spanFor, spanStart, spanWords } from "~/domain/figures/spans"

test("a share is rounded to whole percent, and only all is all", () => {
	expect(wholePercent(1, 3)).toBe(33)
	expect(wholePercent(1, 8)).toBe(13)
	expect(wholePercent(999, 1000)).toBe(99)
	expect(wholePercent(1, 1000)).toBe(1)
	expect(wholePercent(0, 0)).toBe(null)
	expect(() => wholePercent(2, 1)).toThrow(RangeError)
	fc.assert(
		fc.property(fc.nat(1_000_000), fc.nat(1_000_000), (part, rest) => {
			const percent = wholePercent(part, part + rest)
			expect(percent === 100).toBe(rest === 0 && part > 0)
			expect(percent === 0).toBe(part === 0 && rest > 0)
		}),
	)
})

test("what was cut up is not counted among what was to be sold", () => {
	const crop = { soldPieces: 60, stockPieces: 20, wastePieces: 10, missingPieces: 10, cutUpPieces: 100 }
	expect(harvestedPieces(crop)).toBe(200)
	expect(soldPercent(crop)).toBe(60)
})

test("a season is drawn by weeks, three seasons by months, ten by years", () => {
	expect(spanFor({ from: "2026-01-01", to: "2026-12-31" })).toBe("week")
	expect(spanFor({ from: "2024-01-01", to: "2026-12-31" })).toBe("month")
	expect(spanFor({ from: "2017-01-01", to: "2026-12-31" })).toBe("year")
	expect([spanStart("2026-08-09", "week"), spanStart("2026-08-09", "month"), spanStart("2026-08-09", "year")]).toEqual([
		"2026-08-03",
		"2026-08-01",
		"2026-01-01",
	])
	expect([spanWords("2026-08-03", "week"), spanWords("2026-08-01", "month"), spanWords("2026-01-01", "year")]).toEqual([
		"Aug 3",
		"Aug 2026",
		"2026",
	])
})

test("weeks without sales stand between those with sales", () => {
	const sold = (startOn: string) => ({ startOn, storeCents: 100, stallCents: 0 })
	expect(fillSpans([sold("2026-07-27"), sold("2026-08-17")], "week").map(({ startOn }) => startOn)).toEqual([
		"2026-07-27",
		"2026-08-03",
		"2026-08-10",
		"2026-08-17",
	])
	expect(fillSpans([sold("2025-12-01"), sold("2026-02-01")], "month").map(({ startOn }) => startOn)).toEqual([
		"2025-12-01",
		"2026-01-01",
		"2026-02-01",
	])
	expect(fillSpans([sold("2024-01-01"), sold("2026-01-01")], "year")).toHaveLength(3)
	expect(fillSpans([], "week")).toEqual([])
})
