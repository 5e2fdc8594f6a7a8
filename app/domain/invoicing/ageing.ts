import { type Day, daysBetween } from "~/domain/calendar"

/** The ageing columns of a statement, counted in days past the due date. Source: published values "terms" (ageing, from memory, high). */
export const ageingBuckets = ["current", "1–30", "31–60", "61–90", "over 90"] as const
export type AgeingBucket = (typeof ageingBuckets)[number]

/** What is owed, by ageing column, in cents. */
export type Ageing = Record<AgeingBucket, number>

/** The most days past due that a column holds; the last holds all beyond. */
export const AGEING_MOST_DAYS: Record<Exclude<AgeingBucket, "over 90">, number> = {
	current: 0,
	"1–30": 30,
	"31–60": 60,
	"61–90": 90,
}

/** The column for an invoice so many days past its due date; 0 and less is current. */
export function ageingBucket(daysPastDue: number): AgeingBucket {
	return ageingBuckets.find((bucket) => bucket === "over 90" || daysPastDue <= AGEING_MOST_DAYS[bucket]) ?? "over 90"
}

/** Sums what is open into the ageing columns on `today`, in cents, every column present. */
export function ageing(invoices: readonly { dueOn: Day; openCents: number }[], today: Day): Ageing {
	const sums = ageingOf([])
	for (const invoice of invoices) sums[ageingBucket(daysBetween(invoice.dueOn, today))] += invoice.openCents
	return sums
}

/** Sums in the order of the columns, by their names; one that is missing is 0. */
export function ageingOf(sums: readonly (number | null)[]): Ageing {
	return Object.fromEntries(ageingBuckets.map((bucket, index) => [bucket, sums[index] ?? 0])) as Ageing
}
