import { type Day, daysBetween } from "~/domain/calendar"

/** The ageing columns of a statement, counted in days past the due date. Source: published values "terms" (ageing, from memory, high). */
export const ageingBuckets = ["current", "1–30", "31–60", "61–90", "over 90"] as const
export type AgeingBucket = (typeof ageingBuckets)[number]

/** The column for an invoice so many days past its due date; 0 and less is current. */
export function ageingBucket(daysPastDue: number): AgeingBucket {
	if (daysPastDue <= 0) return "current"
	if (daysPastDue <= 30) return "1–30"
	if (daysPastDue <= 60) return "31–60"
	return daysPastDue <= 90 ? "61–90" : "over 90"
}

/** Sums what is open into the ageing columns on `today`, in cents, every column present. */
export function ageing(
	invoices: readonly { dueOn: Day; openCents: number }[],
	today: Day,
): Record<AgeingBucket, number> {
	const sums: Record<AgeingBucket, number> = { current: 0, "1–30": 0, "31–60": 0, "61–90": 0, "over 90": 0 }
	for (const invoice of invoices) sums[ageingBucket(daysBetween(invoice.dueOn, today))] += invoice.openCents
	return sums
}
