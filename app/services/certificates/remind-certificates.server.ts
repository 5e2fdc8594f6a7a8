import { sql } from "drizzle-orm"
import { withProducer } from "~/db/transaction.server"
import { addDays, type Day, dayInZone } from "~/domain/calendar"
import { CERTIFICATE_NOTICE_DAYS, certificateNotice } from "~/domain/receivables/certificate"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findPeopleOfStores } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

type Row = { id: string; name: string; slug: string; producerSlug: string; validUntil: Day }

/**
 * Writes to stores whose resale certificate runs out: 30 days before and 7 days before, once each however often this runs.
 * Not while a newer one waits to be looked at, and not to a store that buys no more. Returns how many stores were written to.
 */
export function remindCertificates(query: {
	producerId: string
	now: Date
	zone: string
}): Promise<{ stores: number }> {
	const { producerId, now, zone } = query
	const today = dayInZone(now, zone)
	return withProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			select s.id, s.name, s.slug, y.slug as "producerSlug", s.resale_certificate_until::text as "validUntil"
			from stores s join producers y on y.id = s.producer_id
			where s.producer_id = ${producerId} and s.is_active
				and s.resale_certificate_until between ${today} and ${addDays(today, Math.max(...CERTIFICATE_NOTICE_DAYS))}
				and not exists (
					select from exemption_certificates c
					where c.producer_id = s.producer_id and c.store_id = s.id and c.state = 'handed-in')
			order by s.id`)
		if (rows.length === 0) return { stores: 0 }
		const storeIds = rows.map(({ id }) => id)
		const people = await findPeopleOfStores(tx, { producerId, storeIds, kind: "reminders" })
		const yard = letterHead(await findYard(tx, producerId))
		const letters = rows.flatMap(({ id, name, slug, producerSlug, validUntil }) =>
			(people.get(id) ?? []).map(({ email }) => ({
				to: email,
				template: "certificate-expiring" as const,
				onceKey: `certificate:${id}:${validUntil}:${certificateNotice(validUntil, today)}`,
				props: {
					yard,
					sentTo: email,
					storeName: name,
					validUntil,
					certificateUrl: `${env.BASE_URL}/buy/${producerSlug}/${slug}/certificate`,
				},
			})),
		)
		await queueMails(tx, producerId, letters)
		return { stores: rows.length }
	})
}
