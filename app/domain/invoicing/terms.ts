import { addDays, type Day, endOfMonth } from "~/domain/calendar"
import { percentOf } from "~/domain/money"
import { percentWords } from "./percent-words"

/**
 * When a store pays. `days` counts from the invoice ("net") or from the end of its month ("end-of-month"), and means
 * nothing on receipt. A discount of `discountBasisPoints` may be taken within `discountDays` of the invoice; 0 is none.
 */
export type Terms = {
	kind: "on-receipt" | "net" | "end-of-month"
	days: number
	discountBasisPoints: number
	discountDays: number
}

/** The day an invoice is due, and the last day of its discount; null without one. */
export type DueDates = { dueOn: Day; discountUntil: Day | null }

function requireDays(days: number): void {
	if (!Number.isSafeInteger(days) || days < 0) throw new RangeError(`not a number of days: ${days}`)
}

function dueOn(terms: Terms, invoicedOn: Day): Day {
	if (terms.kind === "on-receipt") return invoicedOn
	requireDays(terms.days)
	return addDays(terms.kind === "net" ? invoicedOn : endOfMonth(invoicedOn), terms.days)
}

/**
 * The dates of an invoice of `invoicedOn`, which is day 0. End of month counts from the last day of the invoice's month,
 * whatever its date: no month is skipped for invoices late in it. The discount counts from
 * the invoice too. Throws RangeError on negative or fractional days. Source: published values "terms" (due_dates). Some
 * textbooks move invoices of the 26th and later a month on (from memory, medium); buyers read "end of month" differently,
 * so the date itself belongs on every invoice.
 */
export function dueDates(terms: Terms, invoicedOn: Day): DueDates {
	const due = dueOn(terms, invoicedOn)
	if (terms.discountBasisPoints === 0) return { dueOn: due, discountUntil: null }
	requireDays(terms.discountDays)
	return { dueOn: due, discountUntil: addDays(invoicedOn, terms.discountDays) }
}

/** What may be taken off `totalCents` when it is paid within the discount, rounded once to whole cents. */
export function discountCents(terms: Pick<Terms, "discountBasisPoints">, totalCents: number): number {
	return percentOf(totalCents, terms.discountBasisPoints)
}

/** Terms in words: "due on receipt", "net 30 days", "2 % off within 10 days, net 30 days", "10 days after the month ends". */
export function termsWords(terms: Terms): string {
	const days = (count: number) => (count === 1 ? "1 day" : `${count} days`)
	const due =
		terms.kind === "on-receipt"
			? "due on receipt"
			: terms.kind === "net"
				? `net ${days(terms.days)}`
				: terms.days === 0
					? "due at the end of the month"
					: `due ${days(terms.days)} after the month ends`
	if (terms.discountBasisPoints === 0) return due
	return `${percentWords(terms.discountBasisPoints)} off within ${days(terms.discountDays)}, ${due}`
}
