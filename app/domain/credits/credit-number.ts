import { invoiceNumber, parseInvoiceNumber } from "~/domain/invoicing/invoice-number"

/**
 * A credit's number as it is printed: a C, then year and the number within producer and year as invoices have them:
 * "C2026-0003". Throws RangeError on a year or a sequence that cannot be.
 */
export function creditNumber(year: number, sequence: number): string {
	return `C${invoiceNumber(year, sequence)}`
}

/** Reads a credit's number back, as it stands in an address; null when it is none. */
export function parseCreditNumber(text: string): { year: number; sequence: number } | null {
	return text.startsWith("C") ? parseInvoiceNumber(text.slice(1)) : null
}
