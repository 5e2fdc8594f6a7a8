import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CombForm } from "~/domain/grading/grade-comb"

/** A lot as it is graded or regrouped, with what of it lies on the shelves. */
export type LotAtHand = {
	code: string
	state: "held" | "released" | "withdrawn"
	productId: string
	productName: string
	detail: string
	form: CombForm
	pieceNetGrams: number
	grade: string
	flora: string
	harvestedOn: Day
	bestBeforeOn: Day
	moistureTenths: number | null
	pfundTenths: number | null
	shelfPieces: number
}

/** A lot by its code, or null. */
export function findLotAtHand(query: { producerId: string; code: string }): Promise<LotAtHand | null> {
	const { producerId, code } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<LotAtHand>(sql`
			select l.code, l.state, l.product_id as "productId", p.name as "productName", p.detail, p.form,
				p.piece_net_grams as "pieceNetGrams", l.grade, l.flora, l.harvested_on::text as "harvestedOn",
				l.best_before_on::text as "bestBeforeOn", l.moisture_tenths as "moistureTenths", l.pfund_tenths as "pfundTenths",
				coalesce((select sum(b.pieces) from stock_balances b
					where b.producer_id = l.producer_id and b.lot_id = l.id and b.place in ('cold-room', 'ready')), 0)::int
					as "shelfPieces"
			from lots l
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where l.producer_id = ${producerId} and l.code = ${code}`)
		return rows[0] ?? null
	})
}
