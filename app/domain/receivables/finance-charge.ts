import { addDays, compareDays, type Day } from "~/domain/calendar"
import { percentOf } from "~/domain/money"

/** An open invoice as a finance charge looks at it. */
export type ChargedInvoice = { number: string; kind: "goods" | "finance-charge"; dueOn: Day; openCents: number }

/**
 * The charge of one month on what a store had overdue on `asOf` by more than `afterDays` days: so many basis points of it,
 * rounded once to whole cents. Charges are never charged on: only invoices for goods count. Null when nothing is overdue
 * that long or the charge is less than a cent. What may be charged is limited by law and by what was agreed in writing:
 * the rate is the producer's own. This product's own rule.
 */
export function financeCharge(
	invoices: readonly ChargedInvoice[],
	rule: { basisPoints: number; afterDays: number; asOf: Day },
): { cents: number; overdueCents: number; numbers: string[] } | null {
	const overdue = invoices.filter(
		({ kind, dueOn, openCents }) =>
			kind === "goods" && openCents > 0 && compareDays(addDays(dueOn, rule.afterDays), rule.asOf) < 0,
	)
	const overdueCents = overdue.reduce((sum, { openCents }) => sum + openCents, 0)
	const cents = percentOf(overdueCents, rule.basisPoints)
	return cents > 0 ? { cents, overdueCents, numbers: overdue.map(({ number }) => number) } : null
}

/** A charge that is late by more than these days waits for the next month, so that a new rate never reaches back. */
const DAYS_LATE = 3

/** The month that is charged on `today`, by its first following day: on the first days of the next month; else null. */
export function chargedMonth(today: Day): { key: string; asOf: Day } | null {
	if (Number(today.slice(8)) > DAYS_LATE) return null
	const asOf = `${today.slice(0, 7)}-01`
	return { key: addDays(asOf, -1).slice(0, 7), asOf }
}
