import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CountedPlace } from "~/domain/stock/count-place"

/** What a count is of: a shelf, or the table of a market day, which `ref` names; the zero id elsewhere. */
export type CountPlace = { place: CountedPlace; ref: string }

/** A lot that the ledger has at the place, in pieces. */
export type SheetLot = {
	lotId: string
	code: string
	productName: string
	detail: string
	bestBeforeOn: Day
	ledger: number
	/** What earlier counts did not find anywhere. */
	missing: number
}

export type CountSheet = {
	/** The market and day, for a market's table. */
	of: string | null
	lots: SheetLot[]
	/** Lots at the place beyond those listed. */
	more: number
}

/** More lots than a person counts in one go; what is left is counted after these are posted. */
const MOST_LOTS = 400

/**
 * The lots that the ledger has at a place, by product and best-before, at most 400, and those named by code or id besides,
 * whether they are there or not. Null for a market day that there is none of.
 */
export function findCountSheet(
	query: CountPlace & { producerId: string; codes?: readonly string[]; lotIds?: readonly string[] },
): Promise<CountSheet | null> {
	const { producerId, place, ref } = query
	const codes = sql.param([...(query.codes ?? [])])
	const lotIds = sql.param([...(query.lotIds ?? [])])
	return readProducer(producerId, async (tx) => {
		let of: string | null = null
		if (place === "market") {
			const { rows } = await tx.execute<{ of: string }>(sql`
				select m.name || ', ' || to_char(d.market_on, 'FMMonth FMDD') as of
				from market_days d join markets m on m.producer_id = d.producer_id and m.id = d.market_id
				where d.producer_id = ${producerId} and d.id = ${ref}`)
			if (!rows[0]) return null
			of = rows[0].of
		}
		const { rows } = await tx.execute<SheetLot & { isNamed: boolean }>(sql`
			select l.id as "lotId", l.code, p.name as "productName", p.detail, l.best_before_on::text as "bestBeforeOn",
				coalesce(b.pieces, 0) as ledger, coalesce(gone.pieces, 0) as missing,
				(l.code = any(${codes}::text[]) or l.id = any(${lotIds}::uuid[])) as "isNamed"
			from lots l
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
				and b.place = ${place} and b.place_ref = ${ref}
			left join stock_balances gone on gone.producer_id = l.producer_id and gone.lot_id = l.id
				and gone.place = 'missing' and gone.place_ref = '00000000-0000-0000-0000-000000000000'
			where l.producer_id = ${producerId} and l.id in (
				select here.lot_id from stock_balances here
				where here.producer_id = ${producerId} and here.place = ${place} and here.place_ref = ${ref} and here.pieces > 0
				union
				select named.id from lots named
				where named.producer_id = ${producerId}
					and (named.code = any(${codes}::text[]) or named.id = any(${lotIds}::uuid[]))
			)
			order by length(p.code), p.code, l.best_before_on, l.code`)
		const others = rows.filter((row) => !row.isNamed)
		const listed = new Set(others.slice(0, MOST_LOTS).map(({ lotId }) => lotId))
		const lots = rows.filter((row) => row.isNamed || listed.has(row.lotId)).map(({ isNamed: _, ...lot }) => lot)
		return { of, lots, more: Math.max(0, others.length - MOST_LOTS) }
	})
}

/** A place that can be counted, with what the ledger has there. */
export type PlaceToCount = CountPlace & { of: string | null; lots: number; pieces: number }

/** The cold room, the ready shelf, and the tables of market days that have pieces, the latest day first, 20 at most. */
export function listPlacesToCount(producerId: string): Promise<PlaceToCount[]> {
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<PlaceToCount>(sql`
			select b.place, b.place_ref as ref, m.name || ', ' || to_char(d.market_on, 'FMMonth FMDD') as of,
				count(*)::int as lots, sum(b.pieces)::int as pieces
			from stock_balances b
			left join market_days d on d.producer_id = b.producer_id and d.id = b.place_ref
			left join markets m on m.producer_id = d.producer_id and m.id = d.market_id
			where b.producer_id = ${producerId} and b.place in ('cold-room', 'ready', 'market') and b.pieces > 0
			group by b.place, b.place_ref, m.name, d.market_on
			order by b.place = 'market', b.place, d.market_on desc
			limit 22`)
		return rows
	})
}
