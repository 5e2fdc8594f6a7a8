import { sql } from "drizzle-orm"
import Papa from "papaparse"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { RECEIVED_FIELDS, RELEASED_FIELDS } from "~/domain/trace/record-fields"

export type RecordsQuery = {
	producer: { id: string; name: string; timeZone: string }
	/** First and last day: of delivery for what left, of harvest for what came in. */
	from: Day
	to: Day
}

type Contact = [firm: string, address: string, telephone: string, email: string]
type Cells = readonly (string | number)[]

/** Orders, or lots, that are read at once. */
const AT_ONCE = 200

/** A cell that begins like a formula, also after blanks, is given a quote in front, so that a spreadsheet shows it. */
const FORMULA = /^\s*[=+\-@\t\r\n]/

function csvLines(rows: readonly Cells[]): string {
	return `${Papa.unparse(rows as (string | number)[][], { newline: "\r\n", escapeFormulae: FORMULA })}\r\n`
}

/**
 * The record of what left for stores, as pieces of a CSV file: one line for each order and lot, by the day of delivery.
 * Read page by page, so that ten seasons take no more room than one. What the public bought at the stall has no recipient
 * to record (21 CFR 1.327).
 */
export async function* listReleased(query: RecordsQuery): AsyncGenerator<string> {
	yield `\uFEFF${csvLines([RELEASED_FIELDS.map(({ column }) => column)])}`
	let after: { on: Day; id: string } | null = null
	do {
		const page: ReleasedPage = await readProducer(query.producer.id, (tx) => readReleased(tx, query, after))
		if (page.lines.length > 0) yield csvLines(page.lines)
		after = page.next
	} while (after)
}

type ReleasedPage = { lines: Cells[]; next: { on: Day; id: string } | null }

type ReleasedRow = {
	orderId: string
	deliveryOn: Day
	sentOn: Day
	number: number
	store: Contact
	name: string
	detail: string
	flora: string
	lotId: string
	code: string
	pieces: number
	piecesPerCase: number
}

async function readReleased(tx: Tx, query: RecordsQuery, after: { on: Day; id: string } | null): Promise<ReleasedPage> {
	const { producer, from, to } = query
	const beyond = after ? sql`and (o.delivery_on, o.id) > (${after.on}::date, ${after.id}::uuid)` : sql``
	const { rows: orders } = await tx.execute<{ id: string; on: Day }>(sql`
		select o.id, o.delivery_on::text as on from orders o
		where o.producer_id = ${producer.id} and o.delivery_on between ${from} and ${to}
			and o.state in ('sent', 'received') ${beyond}
		order by o.delivery_on, o.id limit ${AT_ONCE}`)
	const ids = sql.param(orders.map(({ id }) => id))
	const { rows } = await tx.execute<ReleasedRow>(sql`
		select o.id as "orderId", o.delivery_on::text as "deliveryOn", o.number,
			coalesce((select (max(v.at) at time zone ${producer.timeZone})::date from order_events v
				where v.producer_id = o.producer_id and v.order_id = o.id and v.kind = 'sent'), o.delivery_on)::text as "sentOn",
			json_build_array(s.name, s.address, s.phone, s.email) as store,
			p.name, p.detail, coalesce(nullif(l.flora, ''), p.flora) as flora, l.id as "lotId", l.code, x.pieces,
			e.pieces_per_case as "piecesPerCase"
		from orders o
		join stores s on s.producer_id = o.producer_id and s.id = o.store_id
		join order_lines e on e.producer_id = o.producer_id and e.order_id = o.id
		join order_line_lots x on x.producer_id = e.producer_id and x.order_line_id = e.id
		join lots l on l.producer_id = x.producer_id and l.id = x.lot_id
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		where o.producer_id = ${producer.id} and o.id = any(${ids}::uuid[])
		order by o.delivery_on, o.id, p.code, l.code`)
	const carrier = await findCarrier(tx, producer)
	const sources = await findSources(tx, producer.id, [...new Set(rows.map(({ lotId }) => lotId))])
	const last = orders.at(-1)
	return {
		lines: rows.map((row) => [
			...row.store,
			"Comb honey",
			producer.name,
			[row.name, row.detail, row.flora].filter(Boolean).join(", "),
			row.sentOn,
			row.code,
			row.pieces,
			packagingWords(row),
			...carrier,
			sources.get(row.lotId) ?? "",
			row.number,
		]),
		next: orders.length === AT_ONCE && last ? last : null,
	}
}

/** "2 cases of 12", "1 case of 12 and 4 single pieces". */
function packagingWords({ pieces, piecesPerCase }: { pieces: number; piecesPerCase: number }): string {
	const cases = Math.floor(pieces / piecesPerCase)
	const odd = pieces - cases * piecesPerCase
	const words = [
		cases > 0 && `${cases} ${cases === 1 ? "case" : "cases"} of ${piecesPerCase}`,
		odd > 0 && `${odd} single ${odd === 1 ? "piece" : "pieces"}`,
	]
	return words.filter(Boolean).join(" and ")
}

/** Who carries: the producer's own van with the producer's address, or another firm as the settings name it. */
async function findCarrier(tx: Tx, producer: { id: string; name: string }): Promise<Contact> {
	const { rows } = await tx.execute<{ carrier: string; address: string; phone: string; email: string }>(sql`
		select carrier, address, phone, email from producer_settings where producer_id = ${producer.id}`)
	const [settings] = rows
	if (!settings) return ["", "", "", ""]
	if (!/^own\b/i.test(settings.carrier)) return [settings.carrier, "", "", ""]
	return [`${producer.name}, ${settings.carrier}`, settings.address, settings.phone, settings.email]
}

/** What each lot was made from: itself and all lots before it, with harvest day and yard. */
async function findSources(tx: Tx, producerId: string, lotIds: readonly string[]): Promise<Map<string, string>> {
	const { rows } = await tx.execute<{ id: string; source: string }>(sql`
		with recursive family (root, lot_id) as (
			select id, id from unnest(${sql.param(lotIds)}::uuid[]) as t (id)
			union
			select f.root, k.from_lot_id from family f
			join lot_links k on k.producer_id = ${producerId} and k.to_lot_id = f.lot_id
		)
		select f.root as id, string_agg(concat_ws(', ', 'lot ' || l.code, 'harvested ' || l.harvested_on, nullif(l.yard, '')),
			'; ' order by f.lot_id <> f.root, l.harvested_on, l.code) as source
		from family f join lots l on l.producer_id = ${producerId} and l.id = f.lot_id
		group by f.root`)
	return new Map(rows.map(({ id, source }) => [id, source]))
}

/**
 * The record of what came in, as pieces of a CSV file: one line for each lot off the hives, by the day of harvest. Lots
 * that were made from other lots came in with those.
 */
export async function* listReceived(query: RecordsQuery): AsyncGenerator<string> {
	yield `\uFEFF${csvLines([RECEIVED_FIELDS.map(({ column }) => column)])}`
	let after: { on: Day; code: string } | null = null
	do {
		const page: ReceivedPage = await readProducer(query.producer.id, (tx) => readReceived(tx, query, after))
		if (page.lines.length > 0) yield csvLines(page.lines)
		after = page.next
	} while (after)
}

type ReceivedPage = { lines: Cells[]; next: { on: Day; code: string } | null }

async function readReceived(
	tx: Tx,
	query: RecordsQuery,
	after: { on: Day; code: string } | null,
): Promise<ReceivedPage> {
	const { producer, from, to } = query
	const beyond = after ? sql`and (l.harvested_on, l.code) > (${after.on}::date, ${after.code}::text)` : sql``
	const { rows } = await tx.execute<{
		code: string
		on: Day
		name: string
		detail: string
		flora: string
		yard: string
		pieces: number
		hives: string | null
		source: Contact
	}>(sql`
		select l.code, l.harvested_on::text as on, p.name, p.detail, coalesce(nullif(l.flora, ''), p.flora) as flora, l.yard,
			l.pieces_harvested as pieces, json_build_array(''::text, c.address, c.phone, c.email) as source,
			(select string_agg(y.name || ', hive ' || h.label, '; ' order by y.name, h.label)
				from supers u
				join hives h on h.producer_id = u.producer_id and h.id = u.hive_id
				join yards y on y.producer_id = h.producer_id and y.id = h.yard_id
				where u.producer_id = l.producer_id and u.harvest_id = l.harvest_id and u.product_id = l.product_id) as hives
		from lots l
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		join producer_settings c on c.producer_id = l.producer_id
		where l.producer_id = ${producer.id} and l.harvested_on between ${from} and ${to} ${beyond}
			and not exists (select from lot_links k where k.producer_id = l.producer_id and k.to_lot_id = l.id)
		order by l.harvested_on, l.code limit ${AT_ONCE}`)
	const last = rows.at(-1)
	return {
		lines: rows.map(({ source: [, ...reached], ...row }) => [
			`${producer.name}, own hives`,
			...reached,
			"Comb honey",
			producer.name,
			[row.name, row.detail, row.flora].filter(Boolean).join(", "),
			row.on,
			row.code,
			row.pieces,
			"pieces in their supers",
			`${producer.name}, own van`,
			...reached,
			row.hives ?? row.yard,
		]),
		next: rows.length === AT_ONCE && last ? { on: last.on, code: last.code } : null,
	}
}
