import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { type BookAccountKey, type Chart, chartOf } from "~/domain/books/accounts"
import type { Day } from "~/domain/calendar"
import { type Closing, readClosings, type StallTax } from "./read-closings.server"

/** How accounts, stores and markets are called, and the tax that the stall's prices contain. */
type BookView = { chart: Chart; names: ReadonlyMap<string, string>; stallTax: StallTax }

export type BookViews = {
	closings: readonly Closing[]
	present: BookView
	/** As it was when the day was closed; as it is while the day is open. */
	on: (day: Day) => BookView
}

/** Reads how the books are to be read, on closed days and on open ones. */
export async function readViews(tx: Tx, producerId: string): Promise<BookViews> {
	const closings = await readClosings(tx, producerId)
	const present: BookView = {
		chart: await readChart(tx, producerId),
		names: await readNames(tx, producerId),
		stallTax: await readStallTax(tx, producerId),
	}
	const names = new Map<string, string>()
	const closed = closings.map(({ until, note }) => {
		for (const [id, name] of Object.entries(note.names)) names.set(id, name)
		return { until, view: { chart: note.chart, stallTax: note.stallTax, names: new Map(names) } }
	})
	return { closings, present, on: (day) => closed.find(({ until }) => day <= until)?.view ?? present }
}

/** The chart of accounts as the bookkeeper wants it now. */
export async function readChart(tx: Tx, producerId: string): Promise<Chart> {
	const { rows } = await tx.execute<{ account: BookAccountKey; number: string; name: string }>(sql`
		select account, number, name from book_accounts where producer_id = ${producerId}`)
	return chartOf(rows)
}

async function readNames(tx: Tx, producerId: string): Promise<Map<string, string>> {
	const { rows } = await tx.execute<{ id: string; name: string }>(sql`
		select id, name from stores where producer_id = ${producerId}
		union all
		select id, name from markets where producer_id = ${producerId}`)
	return new Map(rows.map(({ id, name }) => [id, name]))
}

async function readStallTax(tx: Tx, producerId: string): Promise<StallTax> {
	const { rows } = await tx.execute<StallTax>(sql`
		select s.sales_tax_basis_points as "basisPoints", coalesce((select array_agg(p.id::text order by p.id) from products p
			where p.producer_id = s.producer_id and p.is_taxable), '{}') as "productIds"
		from producer_settings s where s.producer_id = ${producerId}`)
	return rows[0] ?? { basisPoints: 0, productIds: [] }
}
