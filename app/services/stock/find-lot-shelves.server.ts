import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Place } from "~/domain/stock/places"

/** Pieces of a lot at one place. `of` names the store or the market day that the place is about. */
export type LotShelf = { place: Place; ref: string; of: string | null; orderNumber: number | null; pieces: number }

export type LotShelves = {
	lotId: string
	code: string
	productName: string
	detail: string
	shelves: LotShelf[]
}

/** Where the pieces of a lot are, with what names each place in a move; null when there is no lot of that code. */
export function findLotShelves(query: { producerId: string; code: string }): Promise<LotShelves | null> {
	return readProducer(query.producerId, (tx) => readLotShelves(tx, query))
}

/** The same inside a transaction. One statement. */
export async function readLotShelves(tx: Tx, query: { producerId: string; code: string }): Promise<LotShelves | null> {
	const { rows } = await tx.execute<Omit<LotShelves, "shelves"> & LotShelf & { place: Place | null }>(sql`
		select l.id as "lotId", l.code, p.name as "productName", p.detail, b.place, b.place_ref as ref, b.pieces,
			o.number as "orderNumber", coalesce(s.name, m.name || ', ' || to_char(d.market_on, 'FMMonth FMDD')) as of
		from lots l
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id and b.pieces > 0
			and b.place not in ('sold', 'waste', 'cut-up', 'other-lot')
		left join orders o on o.producer_id = b.producer_id and o.id = b.place_ref
		left join stores s on s.producer_id = o.producer_id and s.id = o.store_id
		left join market_days d on d.producer_id = b.producer_id and d.id = b.place_ref
		left join markets m on m.producer_id = d.producer_id and m.id = d.market_id
		where l.producer_id = ${query.producerId} and l.code = ${query.code}
		order by b.place, o.number, d.market_on, b.place_ref`)
	const [first] = rows
	if (!first) return null
	const { lotId, code, productName, detail } = first
	const shelves = rows.flatMap(({ place, ref, of, orderNumber, pieces }) =>
		place === null ? [] : [{ place, ref, of, orderNumber, pieces }],
	)
	return { lotId, code, productName, detail, shelves }
}
