import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { frozenPieces } from "~/domain/cold-room/frozen-pieces"
import { readFreezing } from "~/services/cold-room/read-freezing.server"

export type MissingForRelease = "freezing" | "weighing"

/**
 * What still stands between each of these lots and its release, for a page of a list in two statements; by the same rule as
 * the release itself: frozen are as many pieces as lie on the shelves, and the latest weighing passed.
 */
export async function findMissing(
	tx: Tx,
	query: { producerId: string; lotIds: readonly string[] },
): Promise<Map<string, MissingForRelease[]>> {
	const { producerId, lotIds } = query
	if (lotIds.length === 0) return new Map()
	const { facts } = await readFreezing(tx, query)
	const { rows } = await tx.execute<{ lotId: string; shelfPieces: number; hasPassed: boolean }>(sql`
		select id as "lotId", coalesce(b.pieces, 0) as "shelfPieces", coalesce(c.has_passed, false) as "hasPassed"
		from unnest(${sql.param(lotIds)}::uuid[]) as id
		left join lateral (
			select sum(s.pieces)::int as pieces from stock_balances s
			where s.producer_id = ${producerId} and s.lot_id = id and s.place in ('cold-room', 'ready')
		) b on true
		left join lateral (
			select n.has_passed from net_checks n where n.producer_id = ${producerId} and n.lot_id = id
			order by n.created_at desc, n.id desc limit 1
		) c on true`)
	return new Map(
		rows.map(({ lotId, shelfPieces, hasPassed }) => {
			const frozen = frozenPieces(lotId, facts)
			const isFrozen = frozen > 0 && frozen >= shelfPieces
			return [lotId, [...(isFrozen ? [] : (["freezing"] as const)), ...(hasPassed ? [] : (["weighing"] as const))]]
		}),
	)
}
