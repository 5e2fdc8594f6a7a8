import { salesTax } from "./sales-tax"

/** The sums at the foot of an invoice, in cents. */
export type InvoiceTotals = {
	linesCents: number
	deliveryCents: number
	taxCents: number
	totalCents: number
	/** The tax of each line, in the order of the lines; with `deliveryTaxCents` they sum to `taxCents`. */
	lineTaxCents: number[]
	deliveryTaxCents: number
}

/**
 * Adds up an invoice: what was sent, the delivery and the sales tax. Delivery is taxed only where `isDeliveryTaxable`.
 * Throws RangeError on negative or fractional amounts.
 */
export function invoiceTotals(invoice: {
	lines: readonly { amountCents: number; isTaxable: boolean }[]
	deliveryCents: number
	isDeliveryTaxable: boolean
	taxBasisPoints: number
	isExempt: boolean
}): InvoiceTotals {
	const delivery = { amountCents: invoice.deliveryCents, isTaxable: invoice.isDeliveryTaxable }
	const { taxCents, lineTaxCents } = salesTax({ ...invoice, lines: [...invoice.lines, delivery] })
	const linesCents = invoice.lines.reduce((sum, line) => sum + line.amountCents, 0)
	return {
		linesCents,
		deliveryCents: invoice.deliveryCents,
		taxCents,
		totalCents: linesCents + invoice.deliveryCents + taxCents,
		lineTaxCents: lineTaxCents.slice(0, -1),
		deliveryTaxCents: lineTaxCents.at(-1) ?? 0,
	}
}
