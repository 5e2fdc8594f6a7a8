import type { Day } from "~/domain/calendar"

/** What moves a store's balance, in the order in which things of one day stand on its statement. */
export const entryKinds = ["invoice", "credit", "payment", "return", "discount", "write-off"] as const
export type EntryKind = (typeof entryKinds)[number]

/** One line of a statement. `cents` is the amount as it stands on its own paper; below zero it takes back an earlier one. */
export type Entry = { on: Day; kind: EntryKind; cents: number }

/** What an entry does to the balance: invoices and money that went back raise it, all else lowers it. In cents. */
export function effectOf({ kind, cents }: Pick<Entry, "kind" | "cents">): number {
	return kind === "invoice" || kind === "return" ? cents : -cents
}

/** Entries in order, each with the balance after it. Begins with what was brought forward; cents. */
export function runBalance<Line extends Pick<Entry, "kind" | "cents">>(
	broughtForwardCents: number,
	entries: readonly Line[],
): (Line & { balanceCents: number })[] {
	let balanceCents = broughtForwardCents
	return entries.map((entry) => {
		balanceCents += effectOf(entry)
		return { ...entry, balanceCents }
	})
}

/** What a statement is about: both days belong to it. */
export type StatementRange = { from: Day; until: Day }

/** The sums at the end of a statement, in cents. */
export type StatementSums = {
	broughtForwardCents: number
	/** Of the range, by kind, as they stand on their own papers. */
	byKind: Record<EntryKind, number>
	closingCents: number
}

/** The balance at the end: what was brought forward, + invoices − credits − payments + returns − discounts − write-offs. */
export function closingBalance(broughtForwardCents: number, byKind: Readonly<Record<EntryKind, number>>): number {
	return entryKinds.reduce((sum, kind) => sum + effectOf({ kind, cents: byKind[kind] }), broughtForwardCents)
}
