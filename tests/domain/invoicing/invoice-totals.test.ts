import fc from "fast-check"
import { describe, expect, test } from "vitest"
import { invoiceTotals } from "~/domain/invoicing/invoice-totals"
import { salesTax } from "~/domain/invoicing/sales-tax"
import { lineAmount } from "~/domain/pricing/weighed-line"

const lines = [
	{ amountCents: 32_490, isTaxable: false },
	{ amountCents: 28_500, isTaxable: false },
	{ amountCents: 13_200, isTaxable: false },
	{ amountCents: 18_800, isTaxable: false },
]
const plain = { deliveryCents: 0, isDeliveryTaxable: false, taxBasisPoints: 825, isExempt: false }

describe("the sums of an invoice", () => {
	test("an invoice sums what was sent and the delivery", () => {
		expect(invoiceTotals({ ...plain, lines })).toMatchObject({ linesCents: 92_990, taxCents: 0, totalCents: 92_990 })
		expect(invoiceTotals({ ...plain, lines, deliveryCents: 1800 })).toMatchObject({
			linesCents: 92_990,
			deliveryCents: 1800,
			totalCents: 94_790,
		})
	})

	test("tax is taken once on the sum of the taxable lines, not line by line", () => {
		const three = Array.from({ length: 3 }, () => ({ amountCents: 50, isTaxable: true }))
		expect(invoiceTotals({ ...plain, lines: three, taxBasisPoints: 100 })).toEqual({
			linesCents: 150,
			deliveryCents: 0,
			taxCents: 2,
			totalCents: 152,
			lineTaxCents: [1, 1, 0],
			deliveryTaxCents: 0,
		})
	})

	test("delivery bears tax only where it is taxable", () => {
		const taxed = {
			...plain,
			lines: [{ amountCents: 10_000, isTaxable: true }],
			deliveryCents: 2000,
			taxBasisPoints: 500,
		}
		expect(invoiceTotals(taxed)).toMatchObject({ taxCents: 500, deliveryTaxCents: 0, totalCents: 12_500 })
		expect(invoiceTotals({ ...taxed, isDeliveryTaxable: true })).toMatchObject({
			taxCents: 600,
			lineTaxCents: [500],
			deliveryTaxCents: 100,
		})
	})

	test("a store that buys for resale pays no tax", () => {
		const taxable = lines.map((line) => ({ ...line, isTaxable: true }))
		expect(invoiceTotals({ ...plain, lines: taxable, isExempt: true })).toMatchObject({
			taxCents: 0,
			totalCents: 92_990,
		})
	})

	test("an empty invoice sums to nothing, and a negative line throws", () => {
		expect(invoiceTotals({ ...plain, lines: [] })).toMatchObject({ totalCents: 0, taxCents: 0, lineTaxCents: [] })
		expect(() => invoiceTotals({ ...plain, lines: [{ amountCents: -1, isTaxable: false }] })).toThrow(RangeError)
	})

	test("the tax of the lines sums to the tax, and only taxable lines bear it", () => {
		const anyLine = fc.record({ amountCents: fc.nat(500_000), isTaxable: fc.boolean() })
		fc.assert(
			fc.property(fc.array(anyLine, { maxLength: 12 }), fc.nat(1500), (someLines, taxBasisPoints) => {
				const tax = salesTax({ lines: someLines, taxBasisPoints, isExempt: false })
				expect(tax.lineTaxCents.reduce((a, b) => a + b, 0)).toBe(tax.taxCents)
				for (const [index, cents] of tax.lineTaxCents.entries()) {
					expect(cents).toBeGreaterThanOrEqual(0)
					if (!someLines[index]?.isTaxable) expect(cents).toBe(0)
				}
			}),
		)
	})

	test("whatever was weighed, and at whatever rate: the total is the lines, the delivery and the tax, to the cent", () => {
		const anyLine = fc.record({
			cases: fc.integer({ min: 0, max: 40 }),
			caseCents: fc.nat(50_000),
			poundCents: fc.option(fc.integer({ min: 1, max: 5_000 })),
			weighedGrams: fc.nat(60_000),
			isTaxable: fc.boolean(),
		})
		fc.assert(
			fc.property(
				fc.array(anyLine, { maxLength: 20 }),
				fc.nat(5_000),
				fc.nat(3_000),
				fc.boolean(),
				fc.boolean(),
				(packed, deliveryCents, taxBasisPoints, isDeliveryTaxable, isExempt) => {
					const priced = packed.map((line) => ({ amountCents: lineAmount(line).cents, isTaxable: line.isTaxable }))
					const totals = invoiceTotals({ lines: priced, deliveryCents, isDeliveryTaxable, taxBasisPoints, isExempt })
					const sum = (cents: readonly number[]) => cents.reduce((a, b) => a + b, 0)
					expect(totals.linesCents).toBe(sum(priced.map(({ amountCents }) => amountCents)))
					expect(totals.totalCents).toBe(totals.linesCents + totals.deliveryCents + totals.taxCents)
					expect(sum(totals.lineTaxCents) + totals.deliveryTaxCents).toBe(totals.taxCents)
					if (isExempt) expect(totals.taxCents).toBe(0)
					for (const cents of [totals.taxCents, ...totals.lineTaxCents]) expect(Number.isSafeInteger(cents)).toBe(true)
				},
			),
		)
	})
})
