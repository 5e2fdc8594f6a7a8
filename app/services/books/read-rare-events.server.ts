import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { bookedSteps } from "~/domain/books/booked-steps"
import type { DatedEvent } from "~/domain/books/dated-event"
import type { BookEvent, MoneyWay, ReturnState, ReturnWay } from "~/domain/books/entries"
import { eventWords } from "~/domain/books/event-words"
import { includedTax } from "~/domain/books/included-tax"
import { addDays, type Day, instantAt } from "~/domain/calendar"
import type { BookViews } from "./read-views.server"

export type BooksQuery = { producer: { id: string; timeZone: string }; from: Day; to: Day }

/** An event that may still change or come late, with the state to be noted when the books are closed over it. */
export type RareEvent = DatedEvent & { noted: { id: string; state: string } | null }

/**
 * The events of a period of which there are a few a day at most, by the day on which they are entered: money that went
 * back, Stripe's payouts, and the stall's sales of a day and way to pay together.
 */
export async function readRareEvents(tx: Tx, query: BooksQuery, views: BookViews): Promise<RareEvent[]> {
	const events = [
		...(await readReturns(tx, query, views)),
		...(await readPayouts(tx, query, views)),
		...(await readStallSales(tx, query, views)),
	]
	return events
		.filter(({ on }) => on >= query.from && on <= query.to)
		.toSorted((a, b) => (a.on < b.on ? -1 : a.on > b.on ? 1 : 0))
}

type ReturnRow = {
	id: string
	on: Day
	state: ReturnState
	way: ReturnWay
	method: MoneyWay
	amountCents: number
	storeId: string
	document: string
	note: string
}

async function readReturns(tx: Tx, query: BooksQuery, { closings }: BookViews): Promise<RareEvent[]> {
	const { rows } = await tx.execute<ReturnRow>(sql`
		select r.id, r.returned_on::text as on, r.state, r.kind as way, p.method, r.amount_cents as "amountCents",
			p.store_id as "storeId", coalesce(r.stripe_id, p.reference) as document, r.note
		from payment_returns r join payments p on p.producer_id = r.producer_id and p.id = r.payment_id
		where r.producer_id = ${query.producer.id} and r.returned_on <= ${query.to}
		order by r.returned_on, r.id`)
	return rows.flatMap((row) =>
		bookedSteps(row, closings).map(({ on, from, to }) => {
			const { way, method, amountCents } = row
			const event: BookEvent = { kind: "return", way, method, from, to, amountCents }
			const about = eventWords(event, row.note)
			return { on, event, about, withId: row.storeId, document: row.document, noted: { id: row.id, state: to } }
		}),
	)
}

async function readPayouts(tx: Tx, query: BooksQuery, { closings }: BookViews): Promise<RareEvent[]> {
	const { rows } = await tx.execute<{
		id: string
		on: Day
		grossCents: number
		feeCents: number
		document: string
	}>(sql`
		select id, arrived_on::text as on, gross_cents as "grossCents", fee_cents as "feeCents", stripe_payout_id as document
		from payouts where producer_id = ${query.producer.id} and arrived_on <= ${query.to}
		order by arrived_on, id`)
	return rows.flatMap(({ id, on, grossCents, feeCents, document }) =>
		bookedSteps({ id, on, state: "arrived" }, closings).map((step) => {
			const event: BookEvent = { kind: "payout", grossCents, feeCents }
			return { on: step.on, event, about: eventWords(event), withId: null, document, noted: { id, state: step.to } }
		}),
	)
}

type StallRow = { on: Day; marketId: string; method: "card" | "cash"; productId: string | null; cents: number }

/** A sale counts on the day on which it was paid, which is never a closed one. */
async function readStallSales(tx: Tx, query: BooksQuery, views: BookViews): Promise<RareEvent[]> {
	const { id, timeZone } = query.producer
	const begin = instantAt(query.from, "00:00", timeZone)
	const end = instantAt(addDays(query.to, 1), "00:00", timeZone)
	const { rows } = await tx.execute<StallRow>(sql`
		with paid as (
			select s.id, (s.paid_at at time zone ${timeZone})::date as paid_on, d.market_id, s.method, s.total_cents
			from sales s join market_days d on d.producer_id = s.producer_id and d.id = s.market_day_id
			where s.producer_id = ${id} and s.state = 'paid'
				and s.paid_at >= ${begin.toISOString()}::timestamptz and s.paid_at < ${end.toISOString()}::timestamptz
		)
		select paid_on::text as on, market_id as "marketId", method, null as "productId", sum(total_cents)::int as cents
		from paid group by paid_on, market_id, method
		union all
		select p.paid_on::text, p.market_id, p.method, l.product_id, sum(l.pieces * l.piece_cents)::int
		from paid p join sale_lines l on l.producer_id = ${id} and l.sale_id = p.id
		group by p.paid_on, p.market_id, p.method, l.product_id
		order by 1, 2, 3, 4`)
	return rows
		.filter(({ productId }) => productId === null)
		.map((group) => {
			const { on, marketId, method, cents } = group
			const { basisPoints, productIds } = views.on(on).stallTax
			const taxed = rows
				.filter((row) => row.productId !== null && productIds.includes(row.productId) && isOf(row, group))
				.reduce((sum, row) => sum + row.cents, 0)
			const taxCents = Math.min(includedTax(taxed, basisPoints), cents)
			const event: BookEvent = { kind: "stall-sales", method, totalCents: cents, taxCents }
			return { on, event, about: eventWords(event), withId: marketId, document: "", noted: null }
		})
}

function isOf(row: StallRow, group: StallRow): boolean {
	return row.on === group.on && row.marketId === group.marketId && row.method === group.method
}
