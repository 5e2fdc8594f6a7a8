import { expect, test } from "vitest"
import { netDeclaration, randomWeightWords } from "~/domain/labelling/net-declaration"
import { inchWords, leastTypeSixteenths, panelArea } from "~/domain/labelling/type-size"
import { centsPerOunce, unitPriceWords } from "~/domain/labelling/unit-price"
import { decimalText, exactly } from "~/domain/scale/fraction"

test("labels read as their weight asks: ounces, ounces first, pounds first", () => {
	expect([6.75, 16, 20.5, 64, 83].map(netDeclaration)).toEqual([
		"NET WT 6.75 OZ (191 g)",
		"NET WT 16 OZ (1 LB) 453 g",
		"NET WT 20.5 OZ (1 LB 4.5 OZ) 581 g",
		"NET WT 4 LB (1.81 kg)",
		"NET WT 5 LB 3 OZ (2.35 kg)",
	])
	expect(() => netDeclaration(12.1)).toThrow(RangeError)
})

test("a random weight is rounded down to hundredths of a pound", () => {
	expect([758, 1000, 5].map(randomWeightWords)).toEqual(["0.75 lb", "1.00 lb", "0.00 lb"])
	expect(() => randomWeightWords(0.5)).toThrow(RangeError)
})

test("letters moulded into the package are a sixteenth higher", () => {
	expect(inchWords(leastTypeSixteenths(exactly(20)))).toBe("1/8")
	expect(inchWords(leastTypeSixteenths(exactly(20), true))).toBe("3/16")
	expect(inchWords(16)).toBe("1")
	expect(() => leastTypeSixteenths(exactly(0))).toThrow(RangeError)
})

test("of a shape that is neither box nor round, two fifths of the surface count", () => {
	expect(decimalText(panelArea({ shape: "other", surface: exactly(60) }), 1)).toBe("24.0")
})

test("a unit price of a dollar is shown in dollars, one under it in cents", () => {
	expect(unitPriceWords(centsPerOunce(800, 8))).toBe("$1.00")
	expect(unitPriceWords(centsPerOunce(799, 8))).toBe("99.9¢")
	expect(unitPriceWords(centsPerOunce(799, 8), "whole")).toBe("100¢")
	expect(() => centsPerOunce(100, 0)).toThrow(RangeError)
})
