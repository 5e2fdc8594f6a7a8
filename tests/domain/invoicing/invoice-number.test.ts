import fc from "fast-check"
import { expect, test } from "vitest"
import { invoiceNumber, parseInvoiceNumber } from "~/domain/invoicing/invoice-number"

test("an invoice is numbered within its year", () => {
	expect(invoiceNumber(2026, 1)).toBe("2026-0001")
	expect(invoiceNumber(2026, 1203)).toBe("2026-1203")
	expect(invoiceNumber(2026, 12_345)).toBe("2026-12345")
})

test("a number read back is the same invoice, and no other way to write it is read", () => {
	fc.assert(
		fc.property(fc.integer({ min: 2000, max: 2999 }), fc.integer({ min: 1, max: 999_999 }), (year, sequence) => {
			expect(parseInvoiceNumber(invoiceNumber(year, sequence))).toEqual({ year, sequence })
		}),
	)
	for (const text of [
		"",
		"1203",
		"2026-1",
		"2026-0000",
		"2026-00001",
		"2026-0001 ",
		"2026-0001x",
		"26-0001",
		"2026-12345678",
	]) {
		expect(parseInvoiceNumber(text)).toBeNull()
	}
})

test("a number that cannot be throws", () => {
	for (const [year, sequence] of [
		[2026, 0],
		[2026, -1],
		[2026, 1.5],
		[26, 1],
	] as const) {
		expect(() => invoiceNumber(year, sequence)).toThrow(RangeError)
	}
})
