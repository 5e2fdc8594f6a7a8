import { type SQL, sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { DatedEvent } from "~/domain/books/dated-event"
import type { BookEvent, MoneyWay } from "~/domain/books/entries"
import { eventWords } from "~/domain/books/event-words"
import type { Day } from "~/domain/calendar"
import { creditNumber } from "~/domain/credits/credit-number"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import type { BooksQuery } from "./read-rare-events.server"

/** Where a reading goes on: after this event. `rank` orders the kinds within a day. */
export type Place = { on: Day; rank: number; id: string }

type Row = Place & {
	of: string
	a: number
	b: number
	c: number
	detail: string
	storeId: string
	year: number | null
	sequence: number | null
}

/**
 * One batch of the events of a period of which there are many: invoices, credits, payments, and what settles an invoice
 * without money. Ordered by day, kind and id; each kind is read along its index by day, from `after` on. `next` is where
 * the following batch begins, null at the end.
 */
export async function readFrequentEvents(
	tx: Tx,
	query: BooksQuery & { after: Place | null; limit: number },
): Promise<{ events: DatedEvent[]; next: Place | null }> {
	const { limit } = query
	const { rows } = await tx.execute<Row>(sql`
		select * from (
			(${invoicesOf(query)}) union all (${creditsOf(query)}) union all (${paymentsOf(query)}) union all (${givenUpOf(query)})
		) as e order by e.on, e.rank, e.id limit ${limit}`)
	const last = rows.at(-1)
	return {
		events: rows.map(dated),
		next: rows.length === limit && last ? { on: last.on, rank: last.rank, id: last.id } : null,
	}
}

function invoicesOf(query: Parameters<typeof readFrequentEvents>[1]): SQL {
	return sql`select i.issued_on::text as on, 1 as rank, i.id, i.kind as of, i.lines_cents as a, i.delivery_cents as b,
			i.tax_cents as c, '' as detail, i.store_id as "storeId", i.year, i.sequence
		from invoices i
		where i.producer_id = ${query.producer.id} ${along(query, 1, sql`i.issued_on`, sql`i.id`)}`
}

function creditsOf(query: Parameters<typeof readFrequentEvents>[1]): SQL {
	return sql`select i.issued_on::text, 2, i.id, 'credit', i.lines_cents, i.tax_cents, 0, i.reason, i.store_id, i.year, i.sequence
		from credits i
		where i.producer_id = ${query.producer.id} ${along(query, 2, sql`i.issued_on`, sql`i.id`)}`
}

function paymentsOf(query: Parameters<typeof readFrequentEvents>[1]): SQL {
	return sql`select p.received_on::text, 3, p.id, p.method, p.amount_cents, 0, 0, coalesce(p.stripe_payment_intent_id, p.reference),
			p.store_id, null, null
		from payments p
		where p.producer_id = ${query.producer.id} and p.state = 'settled'
			${along(query, 3, sql`p.received_on`, sql`p.id`)}`
}

/** Settlements by payment or credit enter nothing: those were entered when they came. */
function givenUpOf(query: Parameters<typeof readFrequentEvents>[1]): SQL {
	return sql`select s.settled_on::text, 4, s.id, s.kind, s.amount_cents, 0, 0, '', i.store_id, i.year, i.sequence
		from settlements s join invoices i on i.producer_id = s.producer_id and i.id = s.invoice_id
		where s.producer_id = ${query.producer.id} and s.kind in ('discount', 'write-off')
			${along(query, 4, sql`s.settled_on`, sql`s.id`)}`
}

/** The period from where the last batch ended, in the order of the kind's index, no further than one batch. */
function along(query: Parameters<typeof readFrequentEvents>[1], rank: number, on: SQL, id: SQL): SQL {
	const { from, to, after, limit } = query
	return sql`and ${on} between ${from}::date and ${to}::date ${beyond(after, rank, on, id)}
		order by ${on}, ${id} limit ${limit}`
}

function beyond(after: Place | null, rank: number, on: SQL, id: SQL): SQL {
	if (!after) return sql``
	if (rank < after.rank) return sql`and ${on} > ${after.on}::date`
	if (rank > after.rank) return sql`and ${on} >= ${after.on}::date`
	return sql`and (${on}, ${id}) > (${after.on}::date, ${after.id}::uuid)`
}

function dated(row: Row): DatedEvent {
	const event = eventOf(row)
	const document = documentOf(row)
	const about = eventWords(event, event.kind === "credit" ? row.detail : "")
	return { on: row.on, event, about, withId: row.storeId, document }
}

/** The number on the paper; of a payment what its own paper or Stripe calls it. */
function documentOf({ of, year, sequence, detail }: Row): string {
	if (year === null || sequence === null) return detail
	return of === "credit" ? creditNumber(year, sequence) : invoiceNumber(year, sequence)
}

/** The event of a row, or of a sum of rows: its kind or way to pay, and up to three amounts. */
export function eventOf({ of, a, b, c }: Pick<Row, "of" | "a" | "b" | "c">): BookEvent {
	if (of === "goods" || of === "finance-charge")
		return { kind: "invoice", of, linesCents: a, deliveryCents: b, taxCents: c }
	if (of === "credit") return { kind: "credit", linesCents: a, taxCents: b }
	if (of === "discount" || of === "write-off") return { kind: of, amountCents: a }
	return { kind: "payment", method: of as MoneyWay, amountCents: a }
}
