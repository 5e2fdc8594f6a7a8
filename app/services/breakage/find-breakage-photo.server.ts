import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

/** A photo of a report, or null; with `storeId` it must be of a report of that store. */
export function findBreakagePhoto(query: {
	producerId: string
	storeId?: string
	photoId: string
}): Promise<{ mediaType: string; content: Buffer } | null> {
	const { producerId, storeId, photoId } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ mediaType: string; content: Buffer }>(sql`
			select p.media_type as "mediaType", p.content
			from breakage_photos p
			join breakage_lines l on l.producer_id = p.producer_id and l.id = p.line_id
			join breakage_reports r on r.producer_id = l.producer_id and r.id = l.report_id
			where p.producer_id = ${producerId} and p.id = ${photoId} ${storeId ? sql`and r.store_id = ${storeId}` : sql``}`)
		return rows[0] ?? null
	})
}
