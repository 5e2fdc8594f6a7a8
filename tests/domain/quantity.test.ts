import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { casesWords, parseCases, piecesWords, wholeCases } from "~/domain/quantity"

function refusal(text: string) {
	const parsed = parseCases(text)
	if (parsed.ok) throw new Error(`"${text}" was taken as ${parsed.cases}`)
	return parsed
}

describe("a field for cases", () => {
	test("an empty field is none, and a whole number is itself", () => {
		expect(parseCases("")).toEqual({ ok: true, cases: 0 })
		expect(parseCases("   ")).toEqual({ ok: true, cases: 0 })
		expect(parseCases("0")).toEqual({ ok: true, cases: 0 })
		expect(parseCases(" 3 ")).toEqual({ ok: true, cases: 3 })
		expect(parseCases("007")).toEqual({ ok: true, cases: 7 })
		expect(parseCases("999")).toEqual({ ok: true, cases: 999 })
	})

	test("a negative number is refused in its own words", () => {
		for (const text of ["-1", "−2", "- 3", "-0.5"]) expect(refusal(text).reason).toBe("negative")
		expect(refusal("-1").message).toBe("Cases cannot be less than none. Write 0 to take this line off.")
	})

	test("a part of a case is refused", () => {
		for (const text of ["1.5", "2,5", ".5", "1/2", "3.", "½", "2½"]) expect(refusal(text).reason).toBe("fraction")
		expect(refusal("1.5").message).toBe("Only whole cases are sold. Write a whole number, such as 3.")
	})

	test("text and other ways to write a number are refused", () => {
		for (const text of ["three", "3 cases", "1e3", "0x10", "+3", "Infinity", "NaN", "٣"]) {
			expect(refusal(text).reason).toBe("not-a-number")
		}
	})

	test("a thousands separator is refused, not guessed at", () => {
		for (const text of ["1,000", "1 000", "12,345,678"]) expect(refusal(text).reason).toBe("separator")
	})

	test("more cases than any van takes are refused", () => {
		for (const text of ["1000", "1000000000", "9".repeat(400)]) expect(refusal(text).reason).toBe("too-many")
	})

	test("every refusal is one plain sentence or two, and no text throws", () => {
		fc.assert(
			fc.property(fc.oneof(fc.string(), fc.string({ unit: fc.constantFrom(..."0123456789-., /½e") })), (text) => {
				const parsed = parseCases(text)
				if (parsed.ok) expect(Number.isInteger(parsed.cases) && parsed.cases >= 0 && parsed.cases <= 999).toBe(true)
				else expect(parsed.message).toMatch(/^[A-Z].*\.$/)
			}),
		)
	})

	test("every whole number a line can take is read as itself", () => {
		fc.assert(
			fc.property(fc.integer({ min: 0, max: 999 }), (cases) => {
				expect(parseCases(String(cases))).toEqual({ ok: true, cases })
			}),
		)
	})
})

describe("pieces and cases", () => {
	test("pieces make whole cases only, and one piece over-promised is a case over-promised", () => {
		expect(wholeCases(35, 12)).toBe(2)
		expect(wholeCases(36, 12)).toBe(3)
		expect(wholeCases(0, 12)).toBe(0)
		expect(wholeCases(-1, 12)).toBe(-1)
		expect(() => wholeCases(10, 0)).toThrow(RangeError)
	})

	test("one is said in the singular", () => {
		expect(casesWords(1)).toBe("1 case")
		expect(casesWords(0)).toBe("0 cases")
		expect(piecesWords(1)).toBe("1 piece")
		expect(piecesWords(7)).toBe("7 pieces")
	})
})
