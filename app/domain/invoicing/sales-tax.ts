import { percentOf, splitByLargestRemainder } from "~/domain/money"

/**
 * Sales tax on the taxable lines of one sale: rounded once, half up, on their sum, then split over them by largest
 * remainder, so that the lines always sum to the tax. Lines come back in order; untaxed ones bear 0. With `isExempt` (a
 * valid resale certificate) nothing is taxed. Amounts are cents, the rate basis points (825 is 8.25 %).
 * Throws RangeError on a negative or fractional amount or rate. Local rules decide
 * what is taxable and at which rate.
 */
export function salesTax(sale: {
	lines: readonly { amountCents: number; isTaxable: boolean }[]
	taxBasisPoints: number
	isExempt: boolean
}): { taxCents: number; lineTaxCents: number[] } {
	const weights = sale.lines.map((line) => (line.isTaxable && !sale.isExempt ? line.amountCents : 0))
	for (const amount of [...sale.lines.map((line) => line.amountCents), sale.taxBasisPoints]) {
		if (!Number.isSafeInteger(amount) || amount < 0) throw new RangeError(`not whole cents or basis points: ${amount}`)
	}
	const taxCents = percentOf(
		weights.reduce((sum, cents) => sum + cents, 0),
		sale.taxBasisPoints,
	)
	return { taxCents, lineTaxCents: splitByLargestRemainder(taxCents, weights) }
}
