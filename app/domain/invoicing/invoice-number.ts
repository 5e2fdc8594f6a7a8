const NUMBER = /^(\d{4})-(\d{4}|[1-9]\d{4,6})$/

/**
 * An invoice's number as it is printed: year, dash, the number within producer and year from 1 on: "2026-0001".
 * Past 9999 it grows a digit. Throws RangeError on a year or a sequence that cannot be.
 */
export function invoiceNumber(year: number, sequence: number): string {
	const written = `${year}-${String(sequence).padStart(4, "0")}`
	if (!parseInvoiceNumber(written)) throw new RangeError(`not an invoice number: ${year}, ${sequence}`)
	return written
}

/** Reads an invoice's number back, as it stands in an address or on a cheque; null when it is none. */
export function parseInvoiceNumber(text: string): { year: number; sequence: number } | null {
	const [, year, sequence] = NUMBER.exec(text) ?? []
	if (year === undefined || sequence === undefined || Number(sequence) === 0) return null
	return { year: Number(year), sequence: Number(sequence) }
}
