import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { DatedEvent } from "~/domain/books/dated-event"
import type { BookEvent } from "~/domain/books/entries"
import { addTotals, type Totals, totalsOf } from "~/domain/books/trial-balance"
import { addDays, type Day } from "~/domain/calendar"
import { eventOf } from "./read-frequent-events.server"
import { type BooksQuery, readRareEvents } from "./read-rare-events.server"
import type { BookViews } from "./read-views.server"

/** Before anything was entered. */
export const FIRST_DAY: Day = "1900-01-01"

type Row = { of: string; a: string; b: string; c: string }

/** The totals of a period: of its many events added up in the database, and of the `rare` ones as they were read. */
export async function sumBooks(tx: Tx, query: BooksQuery, rare: readonly DatedEvent[]): Promise<Totals> {
	return totalsOf([...(await sumFrequent(tx, query)), ...rare.map(({ event }) => event)])
}

/** The totals of all entries from the first to the day before: those of the last closing before it, and what came after. */
export async function sumBefore(
	tx: Tx,
	query: { producer: BooksQuery["producer"]; day: Day },
	views: BookViews,
): Promise<Totals> {
	const closing = views.closings.findLast(({ until }) => until < query.day)
	const from = closing ? addDays(closing.until, 1) : FIRST_DAY
	const to = addDays(query.day, -1)
	if (from > to) return closing?.totals ?? {}
	const period = { producer: query.producer, from, to }
	const since = await sumBooks(tx, period, await readRareEvents(tx, period, views))
	return addTotals(closing?.totals ?? {}, since)
}

/**
 * The events of which there are many, one for all of a kind in a period. What a discount or bad debt took back is summed
 * apart: a debit and a credit do not cancel in the totals.
 */
async function sumFrequent(tx: Tx, { producer, from, to }: BooksQuery): Promise<BookEvent[]> {
	const { rows } = await tx.execute<Row>(sql`
		select kind as of, sum(lines_cents) as a, sum(delivery_cents) as b, sum(tax_cents) as c from invoices
		where producer_id = ${producer.id} and issued_on between ${from}::date and ${to}::date group by kind
		union all
		select 'credit', sum(lines_cents), sum(tax_cents), 0 from credits
		where producer_id = ${producer.id} and issued_on between ${from}::date and ${to}::date having count(*) > 0
		union all
		select method, sum(amount_cents), 0, 0 from payments
		where producer_id = ${producer.id} and state = 'settled' and received_on between ${from}::date and ${to}::date
		group by method
		union all
		select kind, sum(amount_cents), 0, 0 from settlements
		where producer_id = ${producer.id} and kind in ('discount', 'write-off')
			and settled_on between ${from}::date and ${to}::date
		group by kind, amount_cents < 0`)
	return rows.map(({ of, a, b, c }) => eventOf({ of, a: Number(a), b: Number(b), c: Number(c) }))
}
