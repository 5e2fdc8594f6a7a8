import { type SQL, sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { compareDays, type Day, isDay } from "~/domain/calendar"
import { type Ageing, ageingOf } from "~/domain/invoicing/ageing"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import {
	closingBalance,
	type EntryKind,
	entryKinds,
	runBalance,
	type StatementRange,
	type StatementSums,
} from "~/domain/receivables/statement"
import { findYard, type Yard } from "~/services/producers/find-yard.server"
import { agedSums } from "./aged-sums.server"
import { statementEntries } from "./statement-entries.server"

/** A line of a statement with the balance after it; cents as on its own paper. */
export type StatementLine = {
	id: string
	on: Day
	kind: EntryKind
	/** Of an invoice or a credit, or of the invoice that a discount or a write-off is on. */
	number: string | null
	/** How it was paid, why it went back, what the credit or the invoice is for. */
	what: string | null
	dueOn: Day | null
	words: string
	cents: number
	balanceCents: number
}

/** A store's account over some days. What is owed and its ageing are as they stood at the end of `range.until`. */
export type Statement = StatementSums & {
	yard: Yard
	store: { name: string; slug: string; address: string; producerSlug: string }
	range: StatementRange
	lines: StatementLine[]
	next: string | null
	ageing: Ageing
	owedCents: number
	/** Paid or credited, and set against no invoice yet. */
	onAccountCents: number
}

type Query = { producerId: string; storeId: string; range: StatementRange; today: Day }
type LineRow = Omit<StatementLine, "number" | "balanceCents"> & {
	rank: number
	num: string
	year: number | null
	sequence: number | null
}
type KindRow = { kind: EntryKind; before: number; within: number; earlier: number }

const PAGE = 100

/**
 * A store's statement, 100 lines at a time; with `isWhole` all of them. `after` is the `next` of an earlier page; one that is
 * malformed gives the first. `range.until` is not after `today`. Throws when there is no such store.
 */
export function findStatement(query: Query & { after?: string | null; isWhole?: boolean }): Promise<Statement> {
	return readProducer(query.producerId, (tx) => readStatement(tx, query))
}

/** As `findStatement`, in a transaction that is open already. */
export async function readStatement(
	tx: Tx,
	query: Query & { after?: string | null; isWhole?: boolean },
): Promise<Statement> {
	const { producerId, range, isWhole = false } = query
	const { kinds, page } = await readLines(tx, query)
	const sumOf = (of: "before" | "within" | "earlier") =>
		Object.fromEntries(
			entryKinds.map((kind) => [kind, kinds.find((row) => row.kind === kind)?.[of] ?? 0]),
		) as StatementSums["byKind"]
	const broughtForwardCents = closingBalance(0, sumOf("before"))
	const byKind = sumOf("within")
	const closingCents = closingBalance(broughtForwardCents, byKind)
	const shown = isWhole ? page : page.slice(0, PAGE)
	const last = shown.at(-1)
	const { aged, owedCents } = await readAgeing(tx, query)
	return {
		yard: await findYard(tx, producerId),
		store: await readStore(tx, query),
		range,
		broughtForwardCents,
		byKind,
		closingCents,
		lines: runBalance(closingBalance(broughtForwardCents, sumOf("earlier")), shown.map(lineOf)),
		next: page.length > shown.length && last ? `${last.on}_${last.rank}_${last.num}_${last.id}` : null,
		ageing: ageingOf(aged),
		owedCents,
		onAccountCents: owedCents - closingCents,
	}
}

function lineOf({ rank: _, num: __, year, sequence, ...line }: LineRow) {
	return { ...line, number: year === null || sequence === null ? null : invoiceNumber(year, sequence) }
}

async function readLines(tx: Tx, query: Parameters<typeof readStatement>[1]) {
	const { range, isWhole = false } = query
	const key = keyOf(query.after ?? null)
	const limit = isWhole ? sql`` : sql`limit ${PAGE + 1}`
	const { rows } = await tx.execute<{ kinds: KindRow[]; page: LineRow[] }>(sql`
		with entries as materialized (${statementEntries({ ...query, until: range.until })})
		select coalesce((select json_agg(row_to_json(kinds)) from (
				select kind, coalesce(sum(cents) filter (where "on" < ${range.from}), 0) as before,
					coalesce(sum(cents) filter (where "on" >= ${range.from}), 0) as within,
					coalesce(sum(cents) filter (where "on" >= ${range.from} and not ${key}), 0) as earlier
				from entries group by kind
			) as kinds), '[]'::json) as kinds,
			coalesce((select json_agg(row_to_json(page)) from (
				select "on", rank, num::text, id, kind, cents, year, sequence, what, due_on as "dueOn", words from entries
				where "on" >= ${range.from} and ${key}
				order by "on", rank, entries.num, id ${limit}
			) as page), '[]'::json) as page`)
	return rows[0] as { kinds: KindRow[]; page: LineRow[] }
}

/** Whether an entry comes after the one that a page ended with. */
function keyOf(after: string | null): SQL {
	const [, on = "", rank, num, id] = /^([\d-]{10})_([1-6])_(\d{1,12})_([0-9a-f-]{36})$/.exec(after ?? "") ?? []
	if (!isDay(on)) return sql`true`
	return sql`("on", rank, entries.num, id) > (${on}::date, ${rank}::int, ${num}::bigint, ${id}::uuid)`
}

async function readAgeing(tx: Tx, { producerId, storeId, range, today }: Query) {
	const isNow = compareDays(range.until, today) >= 0
	// What was settled after the last day was still open on it.
	const open = isNow
		? sql`select i.due_on, i.open_cents from invoices i
			where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.open_cents > 0`
		: sql`select i.due_on, i.open_cents + coalesce(later.cents, 0)::int as open_cents from invoices i
			left join lateral (
				select sum(t.amount_cents) as cents from settlements t
				where t.producer_id = i.producer_id and t.invoice_id = i.id and t.settled_on > ${range.until}
			) as later on true
			where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.issued_on <= ${range.until}`
	const { rows } = await tx.execute<{ aged: (number | null)[]; owedCents: number }>(sql`
		select ${agedSums(sql`due_on`, sql`open_cents`, range.until)} as aged,
			coalesce(sum(open_cents), 0)::float8 as "owedCents"
		from (${open}) as open`)
	return rows[0] as { aged: (number | null)[]; owedCents: number }
}

async function readStore(tx: Tx, { producerId, storeId }: Query): Promise<Statement["store"]> {
	const { rows } = await tx.execute<Statement["store"]>(sql`
		select s.name, s.slug, s.address, y.slug as "producerSlug" from stores s join producers y on y.id = s.producer_id
		where s.producer_id = ${producerId} and s.id = ${storeId}`)
	if (!rows[0]) throw new Error("a statement is of a store that is there")
	return rows[0]
}
