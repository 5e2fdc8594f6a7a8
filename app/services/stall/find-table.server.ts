import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { type Form, shortNames } from "~/domain/stall/short-names"

/** One product on the stall's table, in pieces. */
export type TableItem = {
	productId: string
	form: Form
	name: string
	pieceCents: number
	left: number
	/** What was brought and did not go back: sold, or still there. */
	brought: number
}

type Row = { id: string; code: string; form: Form; flora: string; piece_cents: number; left: number; brought: number }

/**
 * What stands on the table on a market day, in the order of the price list. Products that were not brought are left
 * out, and pieces of a withdrawn lot are none that can be sold.
 */
export async function findTable(tx: Tx, query: { producerId: string; dayId: string }): Promise<TableItem[]> {
	const { rows } = await tx.execute<Row>(sql`
		select p.id, p.code, p.form, p.flora, p.piece_cents,
			coalesce(sum(b.pieces) filter (where b.place = 'market' and l.state <> 'withdrawn'), 0)::int as "left",
			sum(b.pieces)::int as brought
		from stock_balances b
		join lots l on l.producer_id = b.producer_id and l.id = b.lot_id
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		where b.producer_id = ${query.producerId} and b.place in ('market', 'sold') and b.place_ref = ${query.dayId}
			and p.piece_cents is not null
		group by p.producer_id, p.id
		having sum(b.pieces) > 0
		order by p.code`)
	const names = shortNames(rows)
	return rows.map((row) => ({
		productId: row.id,
		form: row.form,
		name: names.get(row.id) ?? row.code,
		pieceCents: row.piece_cents,
		left: row.left,
		brought: row.brought,
	}))
}
