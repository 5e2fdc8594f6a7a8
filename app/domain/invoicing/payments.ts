import { compareDays, type Day, daysBetween } from "~/domain/calendar"

/** What is still open on one invoice. `number` settles the order of invoices of one due date. */
export type OpenInvoice = { id: string; number: string; dueOn: Day; openCents: number }

/** So much of a payment for one invoice. */
export type PaymentPart = { invoiceId: string; cents: number }

/** The order in which a payment goes to invoices: the one due first, then the lesser number. */
export function oldestFirst(a: OpenInvoice, b: OpenInvoice): number {
	return compareDays(a.dueOn, b.dueOn) || a.number.localeCompare(b.number, "en", { numeric: true })
}

/**
 * Lays a payment against open invoices, the one due first, until it is used up. What is over stays on account. Parts are
 * whole cents above 0, oldest invoice first; with `onAccountCents` they sum to the payment, and none is above what its
 * invoice has open. Throws RangeError on a payment or an open amount that is negative or not whole cents.
 * This product's own rule.
 */
export function allocatePayment(
	paymentCents: number,
	invoices: readonly OpenInvoice[],
): { parts: PaymentPart[]; onAccountCents: number } {
	for (const cents of [paymentCents, ...invoices.map((invoice) => invoice.openCents)]) {
		if (!Number.isSafeInteger(cents) || cents < 0) throw new RangeError(`not whole cents: ${cents}`)
	}
	let left = paymentCents
	const parts: PaymentPart[] = []
	for (const invoice of invoices.toSorted(oldestFirst)) {
		const cents = Math.min(left, invoice.openCents)
		if (cents === 0) continue
		parts.push({ invoiceId: invoice.id, cents })
		left -= cents
	}
	return { parts, onAccountCents: left }
}

/** How an invoice stands: what is open, and by how many days it is late (0 until the day after it is due). */
export type InvoiceStanding = {
	state: "paid" | "part-paid" | "open"
	openCents: number
	daysLate: number
}

/** How an invoice stands on `today`. A late day begins after the due date; a paid invoice is never late. */
export function invoiceStanding(
	invoice: { totalCents: number; openCents: number; dueOn: Day },
	today: Day,
): InvoiceStanding {
	const { openCents } = invoice
	if (openCents === 0) return { state: "paid", openCents, daysLate: 0 }
	const daysLate = Math.max(0, daysBetween(invoice.dueOn, today))
	return { state: openCents < invoice.totalCents ? "part-paid" : "open", openCents, daysLate }
}

/** A standing in words: "paid", "open", "part paid, 12 days late". */
export function standingWords({ state, daysLate }: InvoiceStanding): string {
	const late = daysLate === 0 ? "" : daysLate === 1 ? ", 1 day late" : `, ${daysLate} days late`
	return `${state === "part-paid" ? "part paid" : state}${late}`
}
