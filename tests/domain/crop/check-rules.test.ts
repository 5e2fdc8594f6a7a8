import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { judgeCheck, NOTE_LENGTH, type TypedCheck } from "~/domain/crop/check-rules"
import { layoutOf, rowFromMiddle, sharesOfSections, tapsOfRow } from "~/domain/crop/check-sections"
import { superGrid } from "~/domain/crop/super-drawing"

const FACTS = { capacityPieces: 40, setOn: "2026-07-01", today: "2026-08-13" }
const TYPED: TypedCheck = { by: "shares", rows: [], filled: "60", capped: "20", note: "", checkedOn: "2026-08-13" }

const judge = (typed: Partial<TypedCheck>, facts: Partial<typeof FACTS> = {}) =>
	judgeCheck({ ...TYPED, ...typed }, { ...FACTS, ...facts })
const refusals = (typed: Partial<TypedCheck>, facts: Partial<typeof FACTS> = {}) => {
	const judged = judge(typed, facts)
	return judged.ok ? [] : judged.refused.map(({ field, reason }) => `${field}: ${reason}`)
}

describe("a row of sections", () => {
	test("is filled from the middle: one tap of each code fills a row of ten", () => {
		expect(rowFromMiddle("43210", 10)).toBe("0123443210")
		expect(rowFromMiddle("44", 10)).toBe("0004444000")
		expect(rowFromMiddle("", 10)).toBe("0000000000")
	})

	test("has one section in its middle when it is odd", () => {
		expect(tapsOfRow(7)).toBe(4)
		expect(rowFromMiddle("4321", 7)).toBe("1234321")
	})

	test("takes no more taps than fill it, and codes alone", () => {
		expect(() => rowFromMiddle("444444", 10)).toThrow(RangeError)
		expect(() => rowFromMiddle("5", 10)).toThrow(RangeError)
	})

	test("is the same from both ends, whatever was tapped", () => {
		fc.assert(
			fc.property(
				fc.integer({ min: 1, max: 20 }),
				fc.string({ unit: fc.constantFrom(..."01234") }),
				(across, typed) => {
					const taps = typed.slice(0, tapsOfRow(across))
					const row = rowFromMiddle(taps, across)
					expect(row).toHaveLength(across)
					expect([...row].reverse().join("")).toBe(row)
				},
			),
		)
	})

	test("lies in the drawing as it was tapped", () => {
		for (let pieces = 1; pieces <= 400; pieces++) {
			const layout = layoutOf(pieces)
			if (layout) expect([pieces, superGrid(pieces)]).toEqual([pieces, layout])
		}
	})

	test("is a fourth of a super of 40, 32, 28 or 24; others lie in no four rows", () => {
		expect([40, 32, 28, 24].map((pieces) => layoutOf(pieces)?.across)).toEqual([10, 8, 7, 6])
		expect([1, 8, 30, 60, 400].map(layoutOf)).toEqual([null, null, null, null, null])
	})
})

describe("the shares of a super", () => {
	test("count a capped and a full section as filled, and one that is filling as half", () => {
		expect(sharesOfSections("4".repeat(10) + "3".repeat(10) + "2".repeat(10) + "1".repeat(5) + "0".repeat(5))).toEqual({
			filledPercent: 63,
			cappedPercent: 25,
		})
	})

	test("are nothing for bare and begun comb, and all for a capped super", () => {
		expect(sharesOfSections("01".repeat(20))).toEqual({ filledPercent: 0, cappedPercent: 0 })
		expect(sharesOfSections("4".repeat(40))).toEqual({ filledPercent: 100, cappedPercent: 100 })
	})

	test("never have more capped than filled", () => {
		fc.assert(
			fc.property(fc.string({ unit: fc.constantFrom(..."01234"), minLength: 1, maxLength: 80 }), (sections) => {
				const { filledPercent, cappedPercent } = sharesOfSections(sections)
				expect(cappedPercent).toBeLessThanOrEqual(filledPercent)
				expect(filledPercent).toBeLessThanOrEqual(100)
			}),
		)
	})
})

describe("a typed check", () => {
	test("by rows gives sections and their shares", () => {
		const rows = ["44444", "4433", "", "1"]
		const judged = judge({ by: "rows", rows, filled: "nonsense", note: "  bees calm  " })
		expect(judged).toEqual({
			ok: true,
			check: {
				checkedOn: "2026-08-13",
				note: "bees calm",
				sections: "4444444444" + "0334444330" + "0000000000" + "0000110000",
				filledPercent: 45,
				cappedPercent: 35,
			},
		})
	})

	test("by shares gives the shares alone, with or without a percent sign", () => {
		expect(judge({ filled: " 60 % ", capped: "0", rows: ["9"] })).toMatchObject({
			ok: true,
			check: { filledPercent: 60, cappedPercent: 0, sections: "" },
		})
	})

	test("is refused for a day in the future, before the super was set on, or that is none", () => {
		expect(refusals({ checkedOn: "2026-08-14" })).toEqual(["checkedOn: in-future"])
		expect(refusals({ checkedOn: "2026-06-30" })).toEqual(["checkedOn: before-set-on"])
		expect(refusals({ checkedOn: "2026-02-30" })).toEqual(["checkedOn: no-day"])
		expect(refusals({ checkedOn: "2026-07-01" })).toEqual([])
	})

	test("is refused when more is capped than filled, and for shares that are no whole percent", () => {
		expect(refusals({ filled: "20", capped: "21" })).toEqual(["capped: capped-over-filled"])
		expect(refusals({ filled: "101", capped: "-1" })).toEqual(["filled: no-share", "capped: no-share"])
		expect(refusals({ filled: "", capped: "1.5" })).toEqual(["filled: no-share", "capped: no-share"])
		expect(refusals({ filled: "20", capped: "20" })).toEqual([])
	})

	test("is refused when no row was tapped, a row has too much or the super has no rows", () => {
		expect(refusals({ by: "rows", rows: ["", "", "", ""] })).toEqual(["rows: nothing-tapped"])
		expect(refusals({ by: "rows", rows: ["444444", "", "", ""] })).toEqual(["rows: rows-wrong"])
		expect(refusals({ by: "rows", rows: ["45", "", "", ""] })).toEqual(["rows: rows-wrong"])
		expect(refusals({ by: "rows", rows: ["4", "", ""] })).toEqual(["rows: rows-wrong"])
		expect(refusals({ by: "rows", rows: ["", "", "", ""] }, { capacityPieces: 30 })).toEqual(["rows: rows-wrong"])
	})

	test("names all that is wrong at once", () => {
		const note = "a".repeat(NOTE_LENGTH + 1)
		expect(refusals({ checkedOn: "soon", filled: "x", note })).toEqual([
			"checkedOn: no-day",
			"filled: no-share",
			"note: too-long",
		])
	})
})
