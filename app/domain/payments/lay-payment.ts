import type { Day } from "~/domain/calendar"
import { type OpenInvoice, oldestFirst } from "~/domain/invoicing/payments"
import { percentOf } from "~/domain/money"

/** An open invoice with what decides on its discount: what of it was credited and what discount has been taken already. */
export type PayableInvoice = OpenInvoice & {
	totalCents: number
	creditedCents: number
	takenDiscountCents: number
	discountUntil: Day | null
	discountBasisPoints: number
}

/** So much of a payment for one invoice, and the discount that goes with it. */
export type LaidPart = { invoiceId: string; cents: number; discountCents: number }

/** So much as somebody wants to be put to one invoice. */
export type ToldPart = { invoiceId: string; cents: number }

/**
 * The discount that whoever pays the rest on `day` takes, in cents: the invoice's percentage of its total less what was
 * credited, rounded once, on `discountUntil` and before. It is taken once, and never settles an invoice by itself. That
 * part payments in time add up to it is this product's own rule.
 */
export function discountOn(invoice: PayableInvoice, day: Day): number {
	const { discountUntil, takenDiscountCents, discountBasisPoints, openCents } = invoice
	if (discountUntil === null || day > discountUntil || takenDiscountCents > 0) return 0
	const discount = percentOf(invoice.totalCents - invoice.creditedCents, discountBasisPoints)
	return discount < openCents ? discount : 0
}

/** What is to be paid on `day` so that nothing stays open, in cents. */
export function payableOn(invoice: PayableInvoice, day: Day): number {
	return invoice.openCents - discountOn(invoice, day)
}

function requireCents(cents: number): void {
	if (!Number.isSafeInteger(cents) || cents < 0) throw new RangeError(`not whole cents: ${cents}`)
}

/** At most `cents` for one invoice; with the discount where they pay all the rest in time. */
function partOf(invoice: PayableInvoice, cents: number, day: Day): LaidPart {
	const payable = payableOn(invoice, day)
	if (cents < payable) return { invoiceId: invoice.id, cents, discountCents: 0 }
	return { invoiceId: invoice.id, cents: payable, discountCents: invoice.openCents - payable }
}

/**
 * Lays a payment of `day` against open invoices as told: no part is above what is told for it, what its invoice has open,
 * or what is left of the payment. What is over, also of a part whose invoice was settled meanwhile, stays on account.
 * Parts are above 0 and in the order told; with `onAccountCents` they sum to the payment. Throws RangeError on cents that
 * are negative or not whole.
 */
export function layAsTold(
	paymentCents: number,
	told: readonly ToldPart[],
	invoices: readonly PayableInvoice[],
	day: Day,
): { parts: LaidPart[]; onAccountCents: number } {
	for (const cents of [paymentCents, ...told.map((part) => part.cents)]) requireCents(cents)
	const open = new Map(invoices.map((invoice) => [invoice.id, invoice]))
	let left = paymentCents
	const parts: LaidPart[] = []
	for (const { invoiceId, cents } of told) {
		const invoice = open.get(invoiceId)
		if (!invoice) continue
		const part = partOf(invoice, Math.min(cents, left), day)
		if (part.cents === 0) continue
		parts.push(part)
		left -= part.cents
		open.delete(invoiceId)
	}
	return { parts, onAccountCents: left }
}

/** As `layAsTold`, to the invoice due first before the later, each as far as it is open. */
export function layOldestFirst(
	paymentCents: number,
	invoices: readonly PayableInvoice[],
	day: Day,
): { parts: LaidPart[]; onAccountCents: number } {
	const told = invoices.toSorted(oldestFirst).map(({ id, openCents }) => ({ invoiceId: id, cents: openCents }))
	return layAsTold(paymentCents, told, invoices, day)
}

/** The invoices that are open still once the parts are laid, with what is open of them then. */
export function afterParts<Invoice extends PayableInvoice>(
	invoices: readonly Invoice[],
	parts: readonly LaidPart[],
): Invoice[] {
	return invoices.flatMap((invoice) => {
		const part = parts.find(({ invoiceId }) => invoiceId === invoice.id)
		if (!part) return [invoice]
		const openCents = invoice.openCents - part.cents - part.discountCents
		const takenDiscountCents = invoice.takenDiscountCents + part.discountCents
		return openCents > 0 ? [{ ...invoice, openCents, takenDiscountCents }] : []
	})
}

/**
 * Takes `cents` back from what a payment has settled, what was laid last before the earlier; a discount goes with the last
 * cent of its part, since it was given for paying all. Answers what is taken, as positive cents. Throws RangeError when
 * more is asked than was laid.
 */
export function takeBack(cents: number, laid: readonly LaidPart[]): LaidPart[] {
	requireCents(cents)
	let left = cents
	const taken: LaidPart[] = []
	for (const part of laid.toReversed()) {
		if (left === 0) break
		const back = Math.min(left, part.cents)
		if (back === 0) continue
		taken.push({ invoiceId: part.invoiceId, cents: back, discountCents: back === part.cents ? part.discountCents : 0 })
		left -= back
	}
	if (left > 0) throw new RangeError(`${left} cents more than were laid`)
	return taken
}

/** What may still be given back of a payment, in cents: what was paid less what went back or is about to. */
export function refundableCents(payment: {
	amountCents: number
	returns: readonly { state: "asked" | "done" | "failed" | "won"; amountCents: number }[]
}): number {
	const gone = payment.returns.filter(({ state }) => state === "asked" || state === "done")
	return gone.reduce((left, { amountCents }) => left - amountCents, payment.amountCents)
}
