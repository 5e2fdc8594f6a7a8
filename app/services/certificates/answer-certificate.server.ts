import { and, eq } from "drizzle-orm"
import { auditEntries, exemptionCertificates, producers, stores } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { compareDays, type Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findStorePeople } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

/** Until when a certificate holds, or why it does not. */
export type CertificateAnswer = { accepted: true; until: Day } | { accepted: false; sentence: string }

/**
 * Answers a certificate that was handed in: accepted, the store buys for resale until that day; refused, nothing changes
 * but that it is told why. The store's people get a letter. Refused when it is answered already, or the day has passed.
 * Recorded.
 */
export function answerCertificate(query: {
	producerId: string
	certificateId: string
	personId: string
	answer: CertificateAnswer
	today: Day
	now: Date
}): Promise<Result<object, { ok: false; reason: "no-such-certificate" | "answered-already" | "expired" }>> {
	const { producerId, certificateId, personId, answer, today, now } = query
	if (answer.accepted && compareDays(answer.until, today) < 0) return Promise.resolve({ ok: false, reason: "expired" })
	return withProducer(producerId, async (tx) => {
		const isIt = and(eq(exemptionCertificates.producerId, producerId), eq(exemptionCertificates.id, certificateId))
		const [about] = await tx.select({ storeId: exemptionCertificates.storeId }).from(exemptionCertificates).where(isIt)
		if (!about) return { ok: false, reason: "no-such-certificate" }
		const isStore = and(eq(stores.producerId, producerId), eq(stores.id, about.storeId))
		const [store] = await tx
			.select({ name: stores.name, slug: stores.slug, until: stores.resaleCertificateUntil })
			.from(stores)
			.where(isStore)
			.for("no key update")
		const [decided] = await tx
			.update(exemptionCertificates)
			.set({
				state: answer.accepted ? "accepted" : "refused",
				answer: answer.accepted ? "" : answer.sentence,
				...(answer.accepted ? { validUntil: answer.until } : {}),
				decidedBy: personId,
				decidedAt: now,
			})
			.where(and(isIt, eq(exemptionCertificates.state, "handed-in")))
			.returning({ number: exemptionCertificates.number })
		if (!decided || !store) return { ok: false, reason: "answered-already" }
		if (answer.accepted) await tx.update(stores).set({ resaleCertificateUntil: answer.until }).where(isStore)
		await tx.insert(auditEntries).values({
			producerId,
			userId: personId,
			action: answer.accepted ? "certificate accepted" : "certificate refused",
			subjectType: "store",
			subjectId: about.storeId,
			detail: { certificateId, before: store.until, ...answer },
		})
		const [producer] = await tx.select({ slug: producers.slug }).from(producers).where(eq(producers.id, producerId))
		const yard = letterHead(await findYard(tx, producerId))
		const people = await findStorePeople(tx, { producerId, storeId: about.storeId, kind: "invoices" })
		await queueMails(
			tx,
			producerId,
			people.map(({ email }) => ({
				to: email,
				template: "certificate-answer" as const,
				onceKey: `certificate-answer:${certificateId}`,
				props: {
					yard,
					sentTo: email,
					storeName: store.name,
					number: decided.number,
					validUntil: answer.accepted ? answer.until : null,
					reason: answer.accepted ? null : answer.sentence,
					certificateUrl: `${env.BASE_URL}/buy/${producer?.slug}/${store.slug}/certificate`,
				},
			})),
		)
		return { ok: true }
	})
}
