import { randomUUID } from "node:crypto"
import { sql } from "drizzle-orm"
import { auditEntries, bookClosings } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { addTotals, type Totals } from "~/domain/books/trial-balance"
import { addDays, type Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { CLOSING, type ClosingNote } from "./read-closings.server"
import { type RareEvent, readRareEvents } from "./read-rare-events.server"
import { type BookViews, readViews } from "./read-views.server"
import { FIRST_DAY, sumBooks } from "./sum-books.server"

export type ClosedBooks = Result<
	{ totals: Totals },
	{ ok: false; reason: "not-over-yet" } | { ok: false; reason: "closed-already"; until: Day }
>

/**
 * Closes the books until a day before `today`, for good: the database takes nothing more that is dated on it or before. An
 * entry that is being written meanwhile is waited for and is in the totals, or comes later and is refused. Kept with it are
 * the totals of all accounts and what a closed day is read with: names, tax of the stall, states of what may still change.
 */
export async function closeBooks(query: {
	producer: { id: string; timeZone: string }
	until: Day
	today: Day
	personId: string
}): Promise<ClosedBooks> {
	const { producer, until, today, personId } = query
	if (until >= today) return { ok: false, reason: "not-over-yet" }
	return withProducer(producer.id, async (tx) => {
		// The lock of the database's own guard: what was being entered has ended, and nothing begins before this has.
		await tx.execute(sql`select pg_advisory_xact_lock(hashtextextended('books ' || ${producer.id}::text, 0))`)
		const views = await readViews(tx, producer.id)
		const last = views.closings.at(-1)
		if (last && last.until >= until) return { ok: false, reason: "closed-already", until: last.until }
		const period = { producer, from: last ? addDays(last.until, 1) : FIRST_DAY, to: until }
		const rare = await readRareEvents(tx, period, views)
		const totals = addTotals(last?.totals ?? {}, await sumBooks(tx, period, rare))
		const id = randomUUID()
		await tx
			.insert(bookClosings)
			.values({ producerId: producer.id, id, closedUntil: until, totals, closedBy: personId })
		await tx.insert(auditEntries).values({
			producerId: producer.id,
			userId: personId,
			...CLOSING,
			subjectId: id,
			detail: { until, ...noteOf(views, rare) },
		})
		return { ok: true, totals }
	})
}

function noteOf({ closings, present }: BookViews, rare: readonly RareEvent[]): ClosingNote {
	const known = new Map(closings.flatMap(({ note }) => Object.entries(note.names)))
	return {
		chart: present.chart,
		names: Object.fromEntries([...present.names].filter(([id, name]) => known.get(id) !== name)),
		stallTax: present.stallTax,
		states: Object.fromEntries(rare.flatMap(({ noted }) => (noted ? [[noted.id, noted.state]] : []))),
	}
}
