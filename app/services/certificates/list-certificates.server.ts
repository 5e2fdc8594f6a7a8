import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CertificateType } from "~/domain/receivables/certificate"

/** A resale certificate without its file. */
export type ListedCertificate = {
	id: string
	number: string
	validUntil: Day
	fileName: string
	mediaType: CertificateType
	bytes: number
	state: "handed-in" | "accepted" | "refused"
	answer: string
	handedInBy: string
	handedInAt: Date
	decidedBy: string | null
}

/** How a store stands with its certificates: until when it buys for resale, and all it has handed in, the latest first. */
export type StoreCertificates = { validUntil: Day | null; certificates: ListedCertificate[] }

const MOST = 50

/** Reads a store's certificates, the latest 50. Throws when there is no such store. */
export function listCertificates(query: { producerId: string; storeId: string }): Promise<StoreCertificates> {
	const { producerId, storeId } = query
	return readProducer(producerId, async (tx) => {
		const { rows: stores } = await tx.execute<{ validUntil: Day | null }>(sql`
			select resale_certificate_until::text as "validUntil" from stores
			where producer_id = ${producerId} and id = ${storeId}`)
		if (!stores[0]) throw new Error("certificates are of a store that is there")
		const { rows } = await tx.execute<Omit<ListedCertificate, "handedInAt"> & { handedInAt: string }>(sql`
			select c.id, c.number, c.valid_until::text as "validUntil", c.file_name as "fileName", c.media_type as "mediaType",
				length(c.content) as bytes, c.state, c.answer, u.name as "handedInBy", c.handed_in_at as "handedInAt",
				d.name as "decidedBy"
			from exemption_certificates c
			join users u on u.id = c.handed_in_by
			left join users d on d.id = c.decided_by
			where c.producer_id = ${producerId} and c.store_id = ${storeId}
			order by c.handed_in_at desc, c.id limit ${MOST}`)
		return {
			validUntil: stores[0].validUntil,
			certificates: rows.map((row) => ({ ...row, handedInAt: new Date(row.handedInAt) })),
		}
	})
}
