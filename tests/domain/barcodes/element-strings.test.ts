import { expect, test } from "vitest"
import { elementDate, readElementDate } from "~/domain/barcodes/element-dates"
import {
	elementString,
	labelFacts,
	readElementData,
	readHumanElements,
	SEPARATOR,
} from "~/domain/barcodes/element-strings"
import { readRestrictedUpc, restrictedUpc } from "~/domain/barcodes/restricted-upc"

test("day 00 is the last of its month, and the century is the one near the present", () => {
	expect(readElementDate("280200", 2026)).toBe("2028-02-29")
	expect(readElementDate("270200", 2026)).toBe("2027-02-28")
	expect(readElementDate("760101", 2026)).toBe("2076-01-01")
	expect(readElementDate("770101", 2026)).toBe("1977-01-01")
	expect(readElementDate("261301", 2026)).toBeNull()
	expect(readElementDate("270229", 2026)).toBeNull()
	expect(readElementDate("2611", 2026)).toBeNull()
	expect(elementDate("2026-11-30")).toBe("261130")
	expect(() => elementDate("2026-02-30")).toThrow(RangeError)
})

test("a lot before other facts is ended by a separator, and read back by it", () => {
	const elements = [
		{ ai: "01", value: "19501101531007" },
		{ ai: "10", value: "C26-041" },
		{ ai: "37", value: "12" },
		{ ai: "15", value: "270600" },
	]
	const built = elementString(elements)
	const data = `011950110153100710C26-041${SEPARATOR}3712${SEPARATOR}15270600`
	expect(built).toEqual({ ok: true, data, human: "(01)19501101531007(10)C26-041(37)12(15)270600" })
	expect(readElementData(`${SEPARATOR}${data}`)).toEqual({ ok: true, elements })
	expect(labelFacts(elements, 2026)).toEqual({
		netWeight: null,
		bestBeforeOn: "2027-06-30",
		lot: "C26-041",
		count: 12,
	})
})

test("weights are read with as many decimals as their identifier says", () => {
	const weightOf = (ai: string, value: string) => labelFacts([{ ai, value }], 2026).netWeight
	expect(weightOf("3202", "000075")).toEqual({ amount: "0.75", unit: "lb" })
	expect(weightOf("3103", "000340")).toEqual({ amount: "0.340", unit: "kg" })
	expect(weightOf("3200", "000002")).toEqual({ amount: "2", unit: "lb" })
})

test.each([
	["(01)19501101531008", { reason: "wrong-check-digit", ai: "01" }],
	["(99)x", { reason: "unknown-identifier", ai: "99" }],
	["(3206)000075", { reason: "unknown-identifier", ai: "3206" }],
	["(10)", { reason: "not-elements" }],
	["(10)a lot", { reason: "wrong-form", ai: "10" }],
	["(10)123456789012345678901", { reason: "wrong-form", ai: "10" }],
	["(15)261301", { reason: "no-such-day", ai: "15" }],
	["(02)19501101531007", { reason: "missing", ai: "02", needs: "37" }],
	["nonsense", { reason: "not-elements" }],
])("%s is refused", (human, refusal) => {
	expect(readHumanElements(human)).toEqual({ ok: false, ...refusal })
})

test("scanned data that ends early or begins with nothing known is refused", () => {
	expect(readElementData("0119501101531")).toMatchObject({ ok: false, reason: "wrong-form" })
	expect(readElementData("8x")).toMatchObject({ ok: false, reason: "unknown-identifier" })
	expect(readElementData("")).toEqual({ ok: false, reason: "empty" })
	expect(elementString([])).toEqual({ ok: false, reason: "empty" })
})

test("a code with its price is read back, and any wrong digit is noticed", () => {
	const code = restrictedUpc("00007", 1349)
	expect(readRestrictedUpc(code)).toEqual({ item: "00007", priceCents: 1349 })
	for (const [place, digit] of [...code].entries()) {
		const wrong = `${code.slice(0, place)}${(Number(digit) + 1) % 10}${code.slice(place + 1)}`
		expect(readRestrictedUpc(wrong)).toBeNull()
	}
	expect(() => restrictedUpc("00007", 10_000)).toThrow(RangeError)
	expect(() => restrictedUpc("7", 100)).toThrow(RangeError)
})
