import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** A harvest as it was brought in. */
export type FoundHarvest = {
	harvestedOn: Day
	note: string
	supers: number
	capacityPieces: number
	finishedPieces: number
	lots: {
		code: string
		grade: string
		pieces: number
		productName: string
		detail: string
		moistureTenths: number | null
		bestBeforeOn: Day
	}[]
}

/** A harvest with its supers and lots, or null. */
export function findHarvest(query: { producerId: string; harvestId: string }): Promise<FoundHarvest | null> {
	const { producerId, harvestId } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<FoundHarvest>(sql`
			select h.harvested_on::text as "harvestedOn", h.note, s.supers, s."capacityPieces", s."finishedPieces",
				(select coalesce(json_agg(json_build_object('code', l.code, 'grade', l.grade, 'pieces', l.pieces_harvested,
					'productName', p.name, 'detail', p.detail, 'moistureTenths', l.moisture_tenths,
					'bestBeforeOn', l.best_before_on::text) order by l.code), '[]')
					from lots l join products p on p.producer_id = l.producer_id and p.id = l.product_id
					where l.producer_id = h.producer_id and l.harvest_id = h.id) as lots
			from harvests h
			cross join lateral (
				select count(*)::int as supers, coalesce(sum(o.capacity_pieces), 0)::int as "capacityPieces",
					coalesce(sum(o.finished_pieces), 0)::int as "finishedPieces"
				from supers o where o.producer_id = h.producer_id and o.harvest_id = h.id
			) s
			where h.producer_id = ${producerId} and h.id = ${harvestId}`)
		return rows[0] ?? null
	})
}
