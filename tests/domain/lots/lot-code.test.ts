import { describe, expect, test } from "vitest"
import { lotCode, readLotCode, readLotCodePattern } from "~/domain/lots/lot-code"

const facts = { productCode: "21", harvestedOn: "2026-08-13", number: 7 }

describe("lot codes", () => {
	test.each([
		["{product}{yy}-{nnn}", "2126-007"],
		["{yyyy}.{ddd}.{n}", "2026.225.7"],
		["L{yy}-{nn}", "L26-07"],
	])("%s gives %s", (pattern, code) => {
		expect(lotCode(pattern, facts)).toBe(code)
		expect(readLotCodePattern(pattern, { longestProductCode: "21" })).toEqual({ ok: true, pattern })
	})

	test("January 1 is day 001 and the last day of a leap year day 366", () => {
		expect(lotCode("{ddd}", { ...facts, harvestedOn: "2026-01-01" })).toBe("001")
		expect(lotCode("{ddd}", { ...facts, harvestedOn: "2028-12-31" })).toBe("366")
	})

	test.each([
		["{product}-{nnn}", "not-unique"],
		["{yy}-{ddd}", "not-unique"],
		["{yy}-{nnn}-{nnn}", "not-unique"],
		["{yy}{nnn}", "not-unique"],
		["{yy}-{month}-{nnn}", "unknown-token"],
		["comb of {yyyy}-{nnn}", "characters"],
		["lot-code-of-{yyyy}-{nnnn}", "too-long"],
		["{yy}/{nnn}", "characters"],
	])("the pattern %s is refused as %s", (pattern, reason) => {
		expect(readLotCodePattern(pattern, { longestProductCode: "21" })).toMatchObject({ ok: false, reason })
	})

	test("20 characters are taken and 21 are not, as GS1 has it", () => {
		expect(readLotCode("A".repeat(20)).ok).toBe(true)
		expect(readLotCode("A".repeat(21))).toMatchObject({ reason: "too-long" })
	})
})
