import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { findReleaseState, type ReleaseState } from "./find-release-state.server"

export type ReleasePage = {
	code: string
	productName: string
	detail: string
	state: "held" | "released" | "withdrawn"
	expectedReleaseOn: Day
	way: ReleaseState
}

/** A lot with all that is known of its release; null when the producer has none of that code. */
export function findReleasePage(query: { producerId: string; code: string }): Promise<ReleasePage | null> {
	const { producerId, code } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [lot],
		} = await tx.execute<Omit<ReleasePage, "way"> & { id: string }>(sql`
			select l.id, l.code, p.name as "productName", p.detail, l.state, l.expected_release_on::text as "expectedReleaseOn"
			from lots l join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where l.producer_id = ${producerId} and l.code = ${code}`)
		if (!lot) return null
		const { id, ...facts } = lot
		return { ...facts, way: await findReleaseState(tx, { producerId, lotId: id }) }
	})
}
