import { describe, expect, test } from "vitest"
import { clipboardCells, plainCases, readColumns } from "~/domain/orders/read-columns"

const PRODUCTS = [
	{ productId: "round", code: "11" },
	{ productId: "basswood", code: "21" },
	{ productId: "cut", code: "C-41" },
]
const read = (text: string) => readColumns(clipboardCells(text), PRODUCTS)

describe("a list pasted from a spreadsheet", () => {
	test.each([
		["3", "3"],
		[" 3 cases ", "3"],
		["1 case", "1"],
		["12cs", "12"],
		["1,200", "1200"],
		["1 200", "1200"],
		["1.200", "1200"],
		["4.0", "4"],
		["–", ""],
		["", ""],
		["1.5", "1.5"],
		["two", "two"],
		["-2", "-2"],
	])("reads a cell %j as %j", (cell, cases) => expect(plainCases(cell)).toBe(cases))

	test("fills the rows it names, with units and blanks, and keeps what names no product", () => {
		expect(read("11\t3 cases\r\n\r\n21\t\r\nc-41\t2\r\n99\t4\r\n")).toEqual({
			cases: { round: "3", cut: "2" },
			unmatched: [{ row: 5, code: "99", cases: "4" }],
		})
	})

	test("skips a head, finds its columns by their words, and reads codes with zeros before them", () => {
		expect(read("Product\tCode\tCases\nRound\t011\t2\nBasswood\t21\t1").cases).toEqual({ round: "2", basswood: "1" })
		expect(read("What\tHow many\n11\t2").cases).toEqual({ round: "2" })
	})

	test("adds up two rows of one product, and leaves what is no count for the field to refuse", () => {
		expect(read("11\t2\n11\t3\n21\tmany").cases).toEqual({ round: "5", basswood: "many" })
	})

	test("reads columns parted by semicolons or wide gaps, and an empty list as nothing", () => {
		expect(read("11;2\n21;1").cases).toEqual({ round: "2", basswood: "1" })
		expect(read("11   2\n21   1").cases).toEqual({ round: "2", basswood: "1" })
		expect(read("\n \n")).toEqual({ cases: {}, unmatched: [] })
	})
})
