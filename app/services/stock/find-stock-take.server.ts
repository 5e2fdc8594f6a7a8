import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { CountedPlace } from "~/domain/stock/count-place"

type Head = { id: string; place: CountedPlace; of: string | null; who: string | null; postedAt: Date; lots: number }

/** A lot of a count: what was counted, what the ledger had, and the moves that were posted for it. */
export type TakenLine = {
	code: string
	productName: string
	detail: string
	counted: number
	ledger: number
	/** Pieces that were missing and are found. */
	found: number
	/** Pieces that had never been written down. */
	unwritten: number
	/** Why, as it stands in the moves; empty where nothing differed. */
	reason: string
}

/** A count as it was posted; null when there is none of that id. Lines that differ come first, then by lot. */
export function findStockTake(query: {
	producerId: string
	takeId: string
}): Promise<(Head & { lines: TakenLine[] }) | null> {
	const { producerId, takeId } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [head],
		} = await tx.execute<Omit<Head, "postedAt"> & { postedAt: Date | string }>(sql`
			select t.id, t.place, m.name || ', ' || to_char(d.market_on, 'FMMonth FMDD') as of, u.name as who,
				t.posted_at as "postedAt",
				(select count(*) from stock_take_lines l where l.producer_id = t.producer_id and l.stock_take_id = t.id)::int as lots
			from stock_takes t
			left join users u on u.id = t.taken_by
			left join market_days d on d.producer_id = t.producer_id and d.id = t.place_ref
			left join markets m on m.producer_id = d.producer_id and m.id = d.market_id
			where t.producer_id = ${producerId} and t.id = ${takeId}`)
		if (!head) return null
		// The moves of a count are written in its transaction, so they bear its moment.
		const { rows: lines } = await tx.execute<TakenLine>(sql`
			select l.code, p.name as "productName", p.detail, c.counted_pieces as counted, c.ledger_pieces as ledger,
				coalesce(sum(v.pieces) filter (where v.from_place = 'missing'), 0)::int as found,
				coalesce(sum(v.pieces) filter (where v.from_place is null), 0)::int as unwritten,
				coalesce(max(v.reason), '') as reason
			from stock_take_lines c
			join stock_takes t on t.producer_id = c.producer_id and t.id = c.stock_take_id
			join lots l on l.producer_id = c.producer_id and l.id = c.lot_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			left join stock_moves v on v.producer_id = c.producer_id and v.lot_id = c.lot_id and v.moved_at = t.posted_at
				and c.counted_pieces <> c.ledger_pieces
			where c.producer_id = ${producerId} and c.stock_take_id = ${takeId}
			group by l.code, p.name, p.detail, c.counted_pieces, c.ledger_pieces
			order by c.counted_pieces = c.ledger_pieces, l.code`)
		return { ...head, postedAt: new Date(head.postedAt), lines }
	})
}

/** A count in the list. `differing` is the number of its lots that differed, `net` the pieces by which they did. */
export type ListedTake = Head & { differing: number; net: number }

const PAGE = 30

/**
 * The counts of a producer, the latest first, 30 at a time. `after` is the `next` of an earlier page; one that is
 * malformed gives the first page. `next` is null on the last page.
 */
export function listStockTakes(query: {
	producerId: string
	after: string | null
}): Promise<{ takes: ListedTake[]; next: string | null }> {
	const [, moment, id] = /^(\d{4}-\d\d-\d\dT[\d:.]+Z)_([0-9a-f-]{36})$/.exec(query.after ?? "") ?? []
	const beyond = moment && id ? sql`and (t.posted_at, t.id) < (${moment}::timestamptz, ${id}::uuid)` : sql``
	return readProducer(query.producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<ListedTake, "postedAt"> & { postedAt: Date | string; key: string }>(sql`
			with page as (
				select t.* from stock_takes t where t.producer_id = ${query.producerId} ${beyond}
				order by t.posted_at desc, t.id desc limit ${PAGE + 1}
			)
			select t.id, t.place, m.name || ', ' || to_char(d.market_on, 'FMMonth FMDD') as of, u.name as who,
				t.posted_at as "postedAt", to_char(t.posted_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') as key,
				count(c.lot_id)::int as lots,
				count(*) filter (where c.counted_pieces <> c.ledger_pieces)::int as differing,
				coalesce(sum(c.counted_pieces - c.ledger_pieces), 0)::int as net
			from page t
			left join stock_take_lines c on c.producer_id = t.producer_id and c.stock_take_id = t.id
			left join users u on u.id = t.taken_by
			left join market_days d on d.producer_id = t.producer_id and d.id = t.place_ref
			left join markets m on m.producer_id = d.producer_id and m.id = d.market_id
			group by t.id, t.place, m.name, d.market_on, u.name, t.posted_at
			order by t.posted_at desc, t.id desc`)
		const takes = rows.slice(0, PAGE).map(({ key: _, ...take }) => ({ ...take, postedAt: new Date(take.postedAt) }))
		const last = rows[PAGE - 1]
		return { takes, next: rows.length > PAGE && last ? `${last.key}_${last.id}` : null }
	})
}
