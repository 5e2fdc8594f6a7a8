import { auditEntries, exemptionCertificates } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { compareDays, type Day } from "~/domain/calendar"
import { CERTIFICATE_BYTES, certificateType } from "~/domain/receivables/certificate"
import type { Result } from "~/domain/result"

export type HandInRefusal = "expired" | "empty" | "too-large" | "other-type"

/**
 * Keeps a resale certificate as a store handed it in, for the producer to look at. What the file is, its content alone says,
 * whatever its name. Refused when its day has passed, or it is empty, heavier than 10 MB, or no PDF, JPEG, PNG or WebP.
 * `certificateId` is made with the form: sent twice it is kept once. Recorded.
 */
export async function handInCertificate(query: {
	producerId: string
	storeId: string
	personId: string
	certificateId: string
	number: string
	validUntil: Day
	fileName: string
	content: Buffer
	today: Day
}): Promise<Result<object, { ok: false; reason: HandInRefusal }>> {
	const { producerId, storeId, personId, certificateId, number, validUntil, fileName, content, today } = query
	if (compareDays(validUntil, today) < 0) return { ok: false, reason: "expired" }
	if (content.length === 0) return { ok: false, reason: "empty" }
	if (content.length > CERTIFICATE_BYTES) return { ok: false, reason: "too-large" }
	const mediaType = certificateType(content)
	if (!mediaType) return { ok: false, reason: "other-type" }
	return withProducer(producerId, async (tx) => {
		const kept = await tx
			.insert(exemptionCertificates)
			.values({
				producerId,
				id: certificateId,
				storeId,
				number,
				validUntil,
				fileName,
				mediaType,
				content,
				handedInBy: personId,
			})
			.onConflictDoNothing()
			.returning({ id: exemptionCertificates.id })
		if (kept.length === 0) return { ok: true }
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: "certificate handed in",
			subjectType: "store",
			subjectId: storeId,
			detail: { certificateId, number, validUntil, mediaType },
		})
		return { ok: true }
	})
}
