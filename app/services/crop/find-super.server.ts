import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { SuperState } from "~/domain/crop/super-facts"

/** A super and where it stands, or stood. */
export type FoundSuper = {
	id: string
	yardId: string
	yardName: string
	hiveLabel: string
	productName: string
	productDetail: string
	capacityPieces: number
	level: number
	setOn: Day
	state: SuperState
	clearingOn: Day | null
	offOn: Day | null
	/** Pieces fit to sell as sections, once it has come off. */
	finishedPieces: number | null
	readyCappedPercent: number
}

/** One super of the producer, or null. */
export function findSuper(query: { producerId: string; superId: string }): Promise<FoundSuper | null> {
	const { producerId, superId } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<FoundSuper>(sql`
			select s.id, y.id as "yardId", y.name as "yardName", h.label as "hiveLabel", p.name as "productName",
				p.detail as "productDetail", s.capacity_pieces as "capacityPieces", s.level, s.set_on::text as "setOn", s.state,
				s.clearing_on::text as "clearingOn", s.off_on::text as "offOn", s.finished_pieces as "finishedPieces",
				coalesce(t.ready_capped_percent, 90) as "readyCappedPercent"
			from supers s
			join hives h on h.producer_id = s.producer_id and h.id = s.hive_id
			join yards y on y.producer_id = h.producer_id and y.id = h.yard_id
			join products p on p.producer_id = s.producer_id and p.id = s.product_id
			left join producer_settings t on t.producer_id = s.producer_id
			where s.producer_id = ${producerId} and s.id = ${superId}`)
		return rows[0] ?? null
	})
}
