import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { type Form, shortNames } from "~/domain/stall/short-names"

/** Where the pieces of one product went on a market day. */
export type DayPieces = {
	productId: string
	name: string
	/** Loaded out to the market, by the stock ledger. */
	brought: number
	/** Gone back from it, by the ledger. */
	returned: number
	/** In sales that are paid, by the sales. */
	sold: number
	/** In card sales that are still open, by the sales. */
	atCard: number
	/** On the table, by the ledger's balances. */
	left: number
	/** Whether the three books agree: what was brought was sold, waits for a card, is left or went back. */
	agrees: boolean
}

type Row = {
	id: string
	code: string
	form: Form
	flora: string
	brought: number
	returned: number
	sold: number
	at_card: number
	left: number
}

/** The pieces of a market day by product, in the order of the price list: each figure from the book that it is kept in. */
export async function findDayPieces(tx: Tx, query: { producerId: string; dayId: string }): Promise<DayPieces[]> {
	const { producerId, dayId } = query
	const { rows } = await tx.execute<Row>(sql`
		with on_table as (
			select l.product_id, b.lot_id, b.pieces
			from stock_balances b
			join lots l on l.producer_id = b.producer_id and l.id = b.lot_id
			where b.producer_id = ${producerId} and b.place = 'market' and b.place_ref = ${dayId}
		), moved as (
			select t.product_id,
				sum(m.pieces) filter (where m.to_place = 'market' and m.to_ref = ${dayId}
					and m.from_place is distinct from 'sold') as brought,
				sum(m.pieces) filter (where m.from_place = 'market' and m.from_ref = ${dayId}
					and m.to_place <> 'sold') as returned
			from on_table t
			join stock_moves m on m.producer_id = ${producerId} and m.lot_id = t.lot_id
			group by 1
		), gone as (
			select sl.product_id,
				sum(sl.pieces) filter (where s.state = 'paid') as sold,
				sum(sl.pieces) filter (where s.state = 'open') as at_card
			from sales s
			join sale_lines sl on sl.producer_id = s.producer_id and sl.sale_id = s.id
			where s.producer_id = ${producerId} and s.market_day_id = ${dayId}
			group by 1
		), remaining as (
			select product_id, sum(pieces) as "left" from on_table group by 1
		)
		select p.id, p.code, p.form, p.flora, coalesce(moved.brought, 0)::int as brought,
			coalesce(moved.returned, 0)::int as returned, coalesce(gone.sold, 0)::int as sold,
			coalesce(gone.at_card, 0)::int as at_card, coalesce(remaining."left", 0)::int as "left"
		from products p
		left join moved on moved.product_id = p.id
		left join gone on gone.product_id = p.id
		left join remaining on remaining.product_id = p.id
		where p.producer_id = ${producerId} and (moved.brought > 0 or gone.product_id is not null)
		order by p.code`)
	const names = shortNames(rows)
	return rows.map(({ id, code, at_card: atCard, brought, returned, sold, left }) => ({
		productId: id,
		name: names.get(id) ?? code,
		brought,
		returned,
		sold,
		atCard,
		left,
		agrees: brought === returned + sold + atCard + left,
	}))
}
