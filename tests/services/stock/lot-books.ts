import { sql } from "drizzle-orm"
import { withProducer } from "~/db/transaction.server"
import type { Yard } from "../orders/place-yard"

/** The moves of a lot with who made them, the earliest first: "ready to waste, 3, dropped a tray, Ida". */
export async function movesOf(yard: Yard, lotId: string): Promise<string[]> {
	const { rows } = await withProducer(yard.producerId, (tx) =>
		tx.execute<{ move: string }>(sql`
			select concat_ws(', ', coalesce(m.from_place, 'hives') || ' to ' || m.to_place, m.pieces, m.reason, u.name) as move
			from stock_moves m left join users u on u.id = m.moved_by
			where m.producer_id = ${yard.producerId} and m.lot_id = ${lotId} order by m.moved_at, m.id`),
	)
	return rows.map(({ move }) => move)
}

/** What was harvested of a lot, and the sum over its places. */
export async function harvestedAndPlaced(yard: Yard, lotId: string): Promise<{ harvested: number; placed: number }> {
	const {
		rows: [sums],
	} = await withProducer(yard.producerId, (tx) =>
		tx.execute<{ harvested: number; placed: number }>(sql`
			select l.pieces_harvested as harvested, sum(b.pieces)::int as placed
			from lots l join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
			where l.producer_id = ${yard.producerId} and l.id = ${lotId} group by l.pieces_harvested`),
	)
	if (!sums) throw new Error("a lot has pieces")
	return sums
}
