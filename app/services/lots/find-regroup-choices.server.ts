import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { CUT_FORMS } from "~/domain/lots/regroup"

export type RegroupChoices = {
	/** Lots of the same product and state with pieces on the shelves, the earliest best before first. */
	lots: { code: string; grade: string; pieces: number; bestBeforeOn: Day }[]
	/** Products that comb is cut into. */
	products: { id: string; name: string; detail: string; form: string; pieceNetGrams: number }[]
}

/** What a lot can be merged with, and cut up into. */
export function findRegroupChoices(query: { producerId: string; code: string }): Promise<RegroupChoices> {
	const { producerId, code } = query
	return readProducer(producerId, async (tx) => {
		const { rows: lots } = await tx.execute<RegroupChoices["lots"][number]>(sql`
			select o.code, o.grade, b.pieces, o.best_before_on::text as "bestBeforeOn"
			from lots l
			join lots o on o.producer_id = l.producer_id and o.product_id = l.product_id and o.state = l.state and o.id <> l.id
			cross join lateral (
				select sum(s.pieces)::int as pieces from stock_balances s
				where s.producer_id = o.producer_id and s.lot_id = o.id and s.place in ('cold-room', 'ready')
			) b
			where l.producer_id = ${producerId} and l.code = ${code} and b.pieces > 0
			order by o.best_before_on, o.code
			limit 40`)
		const { rows: products } = await tx.execute<RegroupChoices["products"][number]>(sql`
			select p.id, p.name, p.detail, p.form, p.piece_net_grams as "pieceNetGrams" from products p
			where p.producer_id = ${producerId} and p.is_active and p.form = any(${sql.param([...CUT_FORMS])}::text[])
				and not exists (
					select from lots l where l.producer_id = p.producer_id and l.code = ${code} and l.product_id = p.id)
			order by p.name, p.code`)
		return { lots, products }
	})
}
