import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Chart } from "~/domain/books/accounts"
import { type MoneyWeek, moneyByWeek } from "~/domain/books/dated-event"
import type { BookEvent, MoneyWay } from "~/domain/books/entries"
import { addTotals, type TrialBalance, trialBalance } from "~/domain/books/trial-balance"
import type { Day } from "~/domain/calendar"
import { type BooksCheck, findChecks } from "./find-checks.server"
import { closedUntil } from "./read-closings.server"
import { type BooksQuery, readRareEvents } from "./read-rare-events.server"
import { readViews } from "./read-views.server"
import { sumBefore, sumBooks } from "./sum-books.server"

export type Books = {
	chart: Chart
	balance: TrialBalance
	weeks: MoneyWeek[]
	checks: BooksCheck[]
	closedUntil: Day | null
	/** Where the nightly look at Stripe found something else than what stands here. */
	openDifferences: number
}

/** The books of a period: what stood before, what was entered, money in and out by week, and what must agree. */
export function findBooks(query: BooksQuery & { today: Day }): Promise<Books> {
	const { producer, from, to } = query
	return readProducer(producer.id, async (tx) => {
		const views = await readViews(tx, producer.id)
		const before = await sumBefore(tx, { producer, day: from }, views)
		const rare = await readRareEvents(tx, query, views)
		const entered = await sumBooks(tx, query, rare)
		return {
			chart: views.on(to).chart,
			balance: trialBalance(before, entered),
			weeks: moneyByWeek([...(await readPaymentWeeks(tx, query)), ...rare], { from, to }),
			checks: await findChecks(tx, query, { after: addTotals(before, entered) }),
			closedUntil: closedUntil(views.closings),
			openDifferences: await countDifferences(tx, producer.id),
		}
	})
}

async function readPaymentWeeks(tx: Tx, { producer, from, to }: BooksQuery): Promise<{ on: Day; event: BookEvent }[]> {
	const { rows } = await tx.execute<{ on: Day; method: MoneyWay; cents: string }>(sql`
		select min(received_on)::text as on, method, sum(amount_cents) as cents from payments
		where producer_id = ${producer.id} and state = 'settled' and received_on between ${from}::date and ${to}::date
		group by date_trunc('week', received_on), method`)
	return rows.map(({ on, method, cents }) => ({
		on,
		event: { kind: "payment", method, amountCents: Number(cents) },
	}))
}

async function countDifferences(tx: Tx, producerId: string): Promise<number> {
	const { rows } = await tx.execute<{ count: number }>(sql`
		select count(*)::int as count from stripe_differences where producer_id = ${producerId} and settled_at is null`)
	return rows[0]?.count ?? 0
}
