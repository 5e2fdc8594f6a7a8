import { type SQL, sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Period } from "~/domain/books/period"
import type { Day } from "~/domain/calendar"
import { fillSpans, type SoldSpan, type Span, spanFor } from "~/domain/figures/spans"

/** Whose sales, and of which days: of issue for stores, of the market for the stall. Amounts are without tax and delivery. */
export type SalesQuery = Period & { producerId: string }

const asNumber = (value: string | number | null) => Number(value ?? 0)

/** Sales by week, month or year, from the first with sales to the last. */
export async function findSpans(tx: Tx, { producerId, from, to }: SalesQuery, span: Span): Promise<SoldSpan[]> {
	const { rows } = await tx.execute<{ startOn: Day; stores: string; stall: string }>(sql`
		select date_trunc(${span}, day)::date::text as "startOn", sum(stores) as stores, sum(stall) as stall from (
			select i.issued_on as day, sum(i.lines_cents) as stores, 0 as stall from invoices i
			where i.producer_id = ${producerId} and i.kind = 'goods' and i.issued_on between ${from}::date and ${to}::date
			group by i.issued_on
			union all
			select d.market_on, 0, sum(s.total_cents) from market_days d
			join sales s on s.producer_id = d.producer_id and s.market_day_id = d.id and s.state = 'paid'
			where d.producer_id = ${producerId} and d.market_on between ${from}::date and ${to}::date
			group by d.market_on
		) as sold group by 1 order by 1`)
	const sold = rows.map(({ startOn, stores, stall }) => ({
		startOn,
		storeCents: asNumber(stores),
		stallCents: asNumber(stall),
	}))
	return fillSpans(sold, span)
}

export type SoldProduct = {
	code: string
	name: string
	detail: string
	storeCents: number
	storeCases: number
	stallCents: number
	stallPieces: number
}

/**
 * The lines `l` of invoices `i`. Those of one season are looked up invoice by invoice, half the time of a join, which reads
 * the lines of all seasons; those of many are joined.
 */
function linesOfInvoices(query: SalesQuery): SQL {
	if (spanFor(query) !== "week")
		return sql`join invoice_lines l on l.producer_id = i.producer_id and l.invoice_id = i.id`
	return sql`cross join lateral (
		select product_id, line_cents, sent_cases from invoice_lines
		where producer_id = i.producer_id and invoice_id = i.id offset 0
	) as l`
}

/** Sales by product, the most money first. */
export async function findProducts(tx: Tx, { producerId, from, to }: SalesQuery): Promise<SoldProduct[]> {
	const { rows } = await tx.execute<SoldProduct>(sql`
		with stores as (
			select l.product_id, sum(l.line_cents) as cents, sum(l.sent_cases) as cases from invoices i
			${linesOfInvoices({ producerId, from, to })}
			where i.producer_id = ${producerId} and i.kind = 'goods' and i.issued_on between ${from}::date and ${to}::date
				and l.product_id is not null
			group by l.product_id
		), stall as (
			select l.product_id, sum(l.pieces * l.piece_cents) as cents, sum(l.pieces) as pieces from market_days d
			join sales s on s.producer_id = d.producer_id and s.market_day_id = d.id and s.state = 'paid'
			join sale_lines l on l.producer_id = s.producer_id and l.sale_id = s.id
			where d.producer_id = ${producerId} and d.market_on between ${from}::date and ${to}::date
			group by l.product_id
		)
		select p.code, p.name, p.detail, coalesce(a.cents, 0) as "storeCents", coalesce(a.cases, 0) as "storeCases",
			coalesce(b.cents, 0) as "stallCents", coalesce(b.pieces, 0) as "stallPieces"
		from products p left join stores a on a.product_id = p.id left join stall b on b.product_id = p.id
		where p.producer_id = ${producerId} and (a.product_id is not null or b.product_id is not null)
		order by coalesce(a.cents, 0) + coalesce(b.cents, 0) desc, p.code`)
	return rows.map((row) => ({
		...row,
		storeCents: asNumber(row.storeCents),
		storeCases: asNumber(row.storeCases),
		stallCents: asNumber(row.stallCents),
		stallPieces: asNumber(row.stallPieces),
	}))
}

export type SoldStore = { slug: string; name: string; cents: number; invoices: number; lastOn: Day }

/** Sales by store, the most money first: the first `most`, or all. */
export async function findStores(
	tx: Tx,
	{ producerId, from, to }: SalesQuery,
	most: number | null,
): Promise<{ stores: SoldStore[]; count: number }> {
	const { rows } = await tx.execute<SoldStore & { count: number }>(sql`
		with sold as (
			select store_id, sum(lines_cents) as cents, count(*)::int as invoices, max(issued_on) as last_on from invoices
			where producer_id = ${producerId} and kind = 'goods' and issued_on between ${from}::date and ${to}::date
			group by store_id
		)
		select s.slug, s.name, x.cents, x.invoices, x.last_on::text as "lastOn", count(*) over ()::int as count
		from sold x join stores s on s.producer_id = ${producerId} and s.id = x.store_id
		order by x.cents desc, s.name, s.id limit ${most}::int`)
	const stores = rows.map(({ count: _, ...store }) => ({ ...store, cents: asNumber(store.cents) }))
	return { stores, count: rows[0]?.count ?? 0 }
}

/** Stores together, and each market. `of` is null for the stores. */
export type Channel = { of: string | null; cents: number; count: number }

/** Sales by way of selling, the most money first: invoices to stores, sales at each market. */
export async function findChannels(tx: Tx, { producerId, from, to }: SalesQuery): Promise<Channel[]> {
	const { rows } = await tx.execute<Channel>(sql`
		select null as of, coalesce(sum(lines_cents), 0) as cents, count(*)::int as count from invoices
		where producer_id = ${producerId} and kind = 'goods' and issued_on between ${from}::date and ${to}::date
		having count(*) > 0
		union all
		select m.name, x.cents, x.count from (
			select d.market_id, sum(s.total_cents) as cents, count(*)::int as count from market_days d
			join sales s on s.producer_id = d.producer_id and s.market_day_id = d.id and s.state = 'paid'
			where d.producer_id = ${producerId} and d.market_on between ${from}::date and ${to}::date
			group by d.market_id
		) as x join markets m on m.producer_id = ${producerId} and m.id = x.market_id
		order by cents desc`)
	return rows.map((row) => ({ ...row, cents: asNumber(row.cents) }))
}
