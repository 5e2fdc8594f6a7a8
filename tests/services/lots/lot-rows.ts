import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

export type LotPlaces = {
	id: string
	code: string
	state: "held" | "released" | "withdrawn"
	harvested: number
	places: Record<string, number>
	release: { kind: string; reason: string } | null
}

/** Every lot of a producer with its pieces by place, by code. */
export async function placesOf(producerId: string): Promise<LotPlaces[]> {
	const { rows } = await readProducer(producerId, (tx) =>
		tx.execute<LotPlaces>(sql`
			select l.id, l.code, l.state, l.pieces_harvested as harvested,
				(select json_build_object('kind', r.kind, 'reason', r.reason) from lot_releases r
					where r.producer_id = l.producer_id and r.lot_id = l.id) as release,
				coalesce((
					select json_object_agg(b.place, b.pieces) from (
						select place, sum(pieces)::int as pieces from stock_balances s
						where s.producer_id = l.producer_id and s.lot_id = l.id and s.pieces > 0 group by place
					) b), '{}') as places
			from lots l where l.producer_id = ${producerId} order by l.code`),
	)
	return rows
}
