import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Chart } from "~/domain/books/accounts"
import type { NotedStates } from "~/domain/books/booked-steps"
import type { Totals } from "~/domain/books/trial-balance"
import type { Day } from "~/domain/calendar"

/** What was reckoned with where the stall's prices contain tax. */
export type StallTax = { basisPoints: number; productIds: readonly string[] }

/**
 * What a closing keeps beside its totals, so that a closed day reads the same ever after: how accounts were called, the
 * names of stores and markets that were new or had changed, the tax of the stall, and the states of what may still change.
 */
export type ClosingNote = {
	chart: Chart
	names: Record<string, string>
	stallTax: StallTax
	states: Record<string, string>
}

export type Closing = NotedStates & {
	id: string
	closedAt: Date
	closedBy: string
	/** Of all entries up to that day, from the first. */
	totals: Totals
	note: ClosingNote
}

/** The words under which the note of a closing stands in the audit trail. */
export const CLOSING = { action: "close books", subjectType: "book closing" } as const

/** All closings of the books, the earliest first. */
export async function readClosings(tx: Tx, producerId: string): Promise<Closing[]> {
	const { rows } = await tx.execute<Omit<Closing, "states" | "closedAt"> & { closedAt: string }>(sql`
		select c.id, c.closed_until::text as until, c.closed_at as "closedAt", u.name as "closedBy", c.totals, a.detail as note
		from book_closings c
		join users u on u.id = c.closed_by
		join audit_entries a on a.producer_id = c.producer_id and a.subject_type = ${CLOSING.subjectType}
			and a.subject_id = c.id and a.action = ${CLOSING.action}
		where c.producer_id = ${producerId}
		order by c.closed_until`)
	return rows.map((row) => ({ ...row, closedAt: new Date(row.closedAt), states: row.note.states }))
}

/** The last day of closed books; null while nothing is closed. */
export function closedUntil(closings: readonly Closing[]): Day | null {
	return closings.at(-1)?.until ?? null
}
