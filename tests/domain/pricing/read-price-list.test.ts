import { describe, expect, test } from "vitest"
import { readBasisPoints, readCents, readDay, readLeastCases } from "~/domain/pricing/read-figures"
import { readPriceList } from "~/domain/pricing/read-price-list"

describe("amounts and days as spreadsheets write them", () => {
	test("signs, thousands and a decimal comma are read; what is no amount is not guessed at", () => {
		const read: [string, number | null][] = [
			["114", 11_400],
			["$1,118.00", 111_800],
			["1.118,00 €", 111_800],
			["1 118,5", 111_850],
			["1,118", 111_800],
			["USD 9.5", 950],
			["0.005", null],
			["1.118.00", null],
			["1,118,00", null],
			["-5", null],
			["12,34,567", null],
			["free", null],
			["", null],
			["1000000.01", null],
		]
		for (const [text, cents] of read) expect([text, readCents(text)]).toEqual([text, cents])
	})

	test("a day comes as year first, month first with strokes, or day first with points", () => {
		expect(["2026-08-18", "8/18/2026", "18.8.2026"].map(readDay)).toEqual(Array(3).fill("2026-08-18"))
		expect(["18/8/2026", "2026-02-30", "soon", ""].map(readDay)).toEqual([null, null, null, null])
	})

	test("least cases and shares are whole and in range", () => {
		expect(["1", "6 cases", "12+", "0", "1000", "1.5"].map(readLeastCases)).toEqual([1, 6, 12, null, null, null])
		expect(["10", "12.5 %", "7,25%", "0", "100", "100.01", "x"].map(readBasisPoints)).toEqual([
			1000,
			1250,
			725,
			null,
			10_000,
			null,
			null,
		])
	})
})

describe("an uploaded price list", () => {
	const sizes = { pieceNetGrams: 340, piecesPerCase: 12 }
	const book = {
		products: [
			{ id: "round", code: "11", name: "Round section", pricedBy: "case" as const, ...sizes },
			{ id: "frame", code: "61", name: "Whole frame", pricedBy: "weight" as const, ...sizes },
		],
		tiers: [{ id: "shops", name: "Shops" }],
		prices: [
			{
				tierId: "shops",
				productId: "round",
				minCases: 1,
				caseCents: 11_400,
				poundCents: null,
				validFrom: "2026-01-01",
			},
			{ tierId: "shops", productId: "frame", minCases: 1, caseCents: 8095, poundCents: 900, validFrom: "2026-01-01" },
		],
	}
	const HEAD = ["Code", "Tier", "Min cases", "Case price", "Price per lb", "Valid from"]
	const TODAY = "2026-08-13"

	test("shows what is new, changed and unchanged against what holds on the day", () => {
		const preview = readPriceList(
			[
				HEAD,
				["11", "shops", "", "$118.00", "", "2026-09-01"],
				["11", "Shops", "3", "108,30", "", ""],
				["61", "Shops", "1", "", "9.00", ""],
				["", "", "", "", "", ""],
			],
			book,
			TODAY,
		)
		expect(preview?.odd).toEqual([])
		expect(
			preview?.changes.map(({ row, kind, oldCents, cents, validFrom }) => [row, kind, oldCents, cents, validFrom]),
		).toEqual([
			[2, "changed", 11_400, 11_800, "2026-09-01"],
			[3, "new", null, 10_830, TODAY],
			[4, "unchanged", 900, 900, TODAY],
		])
	})

	test("a row that is not understood says why, and the others count all the same", () => {
		const preview = readPriceList(
			[
				HEAD,
				["99", "Shops", "", "5", "", ""],
				["11", "Nobody", "", "5", "", ""],
				["11", "Shops", "none", "5", "", ""],
				["11", "Shops", "", "dear", "", ""],
				["11", "Shops", "", "", "5", ""],
				["11", "Shops", "", "5", "", "2026-08-12"],
				["11", "Shops", "", "5", "", "tomorrow"],
				["11", "Shops", "", "5", "", ""],
				["11", "Shops", "1", "6", "", TODAY],
			],
			book,
			TODAY,
		)
		expect(preview?.changes.map(({ row, cents }) => [row, cents])).toEqual([[9, 500]])
		expect(preview?.odd.map(({ row, why }) => [row, why])).toEqual([
			[2, "No product has the code “99”."],
			[3, "No price tier is named “Nobody”."],
			[4, "“none” is not a number of cases from 1 to 999."],
			[5, "“dear” is not a price."],
			[6, "It is priced by the case: write a case price, and none per lb."],
			[7, "It begins before today, and what was in force is not changed."],
			[8, "“tomorrow” is not a day."],
			[10, "The same price stands further up in the list."],
		])
	})

	test("a file whose first row does not name the columns is not read", () => {
		expect(readPriceList([["11", "Shops", "5"]], book, TODAY)).toBe(null)
		expect(readPriceList([], book, TODAY)).toBe(null)
	})
})
