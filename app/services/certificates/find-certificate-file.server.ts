import { and, eq } from "drizzle-orm"
import { exemptionCertificates } from "~/db/schema"
import { readProducer } from "~/db/transaction.server"

/** The file of a certificate as it was handed in, or null when there is none. */
export function findCertificateFile(query: { producerId: string; certificateId: string }) {
	const { producerId, certificateId } = query
	return readProducer(producerId, async (tx) => {
		const [found] = await tx
			.select({
				number: exemptionCertificates.number,
				mediaType: exemptionCertificates.mediaType,
				content: exemptionCertificates.content,
			})
			.from(exemptionCertificates)
			.where(and(eq(exemptionCertificates.producerId, producerId), eq(exemptionCertificates.id, certificateId)))
		return found ?? null
	})
}
