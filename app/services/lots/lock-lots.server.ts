import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { LotFacts } from "~/domain/lots/regroup"

/** Where pieces lie that can be regrouped. */
export const SHELVES = ["cold-room", "ready"] as const
export type Shelf = (typeof SHELVES)[number]

export type ShelfPieces = Record<Shelf, number>

/** A lot whose row is held until the transaction ends, with what of it lies on the shelves. */
export type LockedLot = LotFacts & {
	id: string
	code: string
	shelves: ShelfPieces
	productCode: string
	pieceNetGrams: number
}

/** Locks lots by code, in the order of their ids, so that nobody packs, withdraws or regroups them meanwhile. */
export async function lockLots(tx: Tx, query: { producerId: string; codes: readonly string[] }): Promise<LockedLot[]> {
	const { producerId, codes } = query
	await tx.execute(sql`
		select id from lots where producer_id = ${producerId} and code = any(${sql.param(codes)}::text[])
		order by id for no key update`)
	const { rows } = await tx.execute<LockedLot>(sql`
		select l.id, l.code, l.product_id as "productId", l.state, l.harvested_on::text as "harvestedOn",
			l.expected_release_on::text as "expectedReleaseOn", l.best_before_on::text as "bestBeforeOn", l.yard, l.grade, l.flora,
			l.moisture_tenths as "moistureTenths", l.pfund_tenths as "pfundTenths", p.code as "productCode",
			p.piece_net_grams as "pieceNetGrams",
			json_build_object(
				'cold-room', coalesce(sum(b.pieces) filter (where b.place = 'cold-room'), 0),
				'ready', coalesce(sum(b.pieces) filter (where b.place = 'ready'), 0)) as shelves
		from lots l
		join products p on p.producer_id = l.producer_id and p.id = l.product_id
		left join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
		where l.producer_id = ${producerId} and l.code = any(${sql.param(codes)}::text[])
		group by l.producer_id, l.id, p.producer_id, p.id
		order by l.harvested_on, l.code`)
	return rows
}
