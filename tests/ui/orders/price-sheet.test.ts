import { describe, expect, test } from "vitest"
import { breakColumns, keepRows, priceInColumn, priceSheet, type SheetProduct } from "~/ui/orders/price-sheet"
import { stripWords } from "~/ui/orders/strip-words"

const TERMS = { minimumCents: 60_000, deliveryChargeCents: 1_800, freeAboveCents: 60_000 }

function product(code: string, more: Partial<SheetProduct> = {}): SheetProduct {
	return {
		productId: code,
		code,
		name: `Product ${code}`,
		detail: "8 oz",
		pieceNetGrams: 226,
		piecesPerCase: 12,
		breakFamily: code,
		breaks: [
			{ minCases: 1, caseCents: 11_400 },
			{ minCases: 3, caseCents: 10_830 },
		],
		strip: { free: 16, held: 0, heldUntil: null, expected: 0, expectedOn: null, next: null, freeCases: 16 },
		toShareCases: 0,
		lastCases: 0,
		usualCases: 0,
		orderedCases: 0,
		mayAsk: true,
		...more,
	}
}

describe("the sheet as it is typed", () => {
	test("leaves out of the sure sum what is more than free, and counts as none what cannot be read", () => {
		const products = [product("11"), product("21"), product("31")]
		const { rows, price } = priceSheet(products, { "cases-11": "3", "cases-21": "17", "cases-31": "some" }, TERMS)
		expect(rows.map((row) => [row.cases, row.isBeyondFree])).toEqual([
			[3, false],
			[17, true],
			[0, false],
		])
		// Sixteen of the seventeen are free: they are sure, and only the last is to be shared out.
		expect(price).toMatchObject({ sureCents: 32_490 + 173_280, sharedCents: 10_830, deliveryCents: 0 })
	})

	test("counts only what is free where the buyer takes no more", () => {
		const typed = { "cases-11": "17", "keep-11": "free" }
		const { rows, price } = priceSheet([product("11")], typed, TERMS)
		expect(rows[0]).toMatchObject({ cases: 17, sureCases: 16, sharedCases: 0, isBeyondFree: true })
		expect(price).toMatchObject({ sureCents: 173_280, sharedCents: 0, cases: 16 })
	})

	test("draws only the rows anew that show something else", () => {
		const products = [product("11", { breakFamily: "a" }), product("21", { breakFamily: "a" }), product("31")]
		const before = priceSheet(products, { "cases-11": "1" }, TERMS).rows
		const after = keepRows(before, priceSheet(products, { "cases-11": "2" }, TERMS).rows)
		expect(after.map((row, index) => row === before[index])).toEqual([false, true, true])
	})

	test("heads the columns of the breaks in words, and shows a product of fewer breaks its own price in each", () => {
		const single = product("52", { breaks: [{ minCases: 1, caseCents: 9_000 }] })
		const columns = breakColumns([
			product("11", {
				breaks: [
					{ minCases: 1, caseCents: 11_400 },
					{ minCases: 3, caseCents: 10_830 },
					{ minCases: 6, caseCents: 10_260 },
				],
			}),
			single,
		])
		expect(columns.map(({ head }) => head.join(" "))).toEqual(["1 or 2 cases", "3 to 5 cases", "6 or more"])
		expect(columns.map((column) => priceInColumn(single.breaks, column))).toEqual([9_000, 9_000, 9_000])
	})
})

describe("the words under a strip", () => {
	const strip = product("11").strip
	test.each([
		[{ ...strip, held: 6, heldUntil: "2026-08-14" }, 0, "16 free, 6 held until Friday"],
		[{ ...strip, expected: 8, expectedOn: "2026-08-24" }, 0, "16 free, 8 expected August 24"],
		[{ ...strip, held: 5 }, 0, "16 free, 5 held"],
		[strip, 31, "16 for all stores, 31 asked"],
		[{ ...strip, free: 0, freeCases: 0, next: { on: "2026-08-24", quantity: 8 } }, 0, "8 expected August 24"],
		[{ ...strip, free: 0, freeCases: 0 }, 0, "none left"],
	])("say what is there (%#)", (of, toShareCases, words) => {
		expect(stripWords(product("11", { strip: of, toShareCases }), "2026-08-13")).toBe(words)
	})
})
