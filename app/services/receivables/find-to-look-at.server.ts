import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"
import { CERTIFICATE_NOTICE_DAYS } from "~/domain/receivables/certificate"

/** Something about a store that a person should look at: a certificate that waits or runs out, or a promise whose day has passed. */
export type ToLookAt = {
	kind: "certificate-waits" | "certificate-ends" | "promise-passed"
	storeSlug: string
	storeName: string
	/** The day the certificate ends, or on which it was promised to pay. */
	on: Day
	/** Of a promise. */
	amountCents: number | null
}

const MOST = 50

/** As `readToLookAt`, in a transaction of its own. */
export function findToLookAt(query: { producerId: string; today: Day }): Promise<ToLookAt[]> {
	return readProducer(query.producerId, (tx) => readToLookAt(tx, query))
}

/** All that is to be looked at, the earliest day first, at most 50. */
export async function readToLookAt(tx: Tx, query: { producerId: string; today: Day }): Promise<ToLookAt[]> {
	const { producerId, today } = query
	const { rows } = await tx.execute<ToLookAt>(sql`
			select found.kind, s.slug as "storeSlug", s.name as "storeName", found.day::text as "on",
				found.cents as "amountCents"
			from (
				select 'certificate-waits' as kind, c.store_id, c.valid_until as day, null::int as cents
				from exemption_certificates c where c.producer_id = ${producerId} and c.state = 'handed-in'
				union all
				select 'certificate-ends', s.id, s.resale_certificate_until, null
				from stores s
				where s.producer_id = ${producerId} and s.is_active
					and s.resale_certificate_until between ${today} and ${addDays(today, Math.max(...CERTIFICATE_NOTICE_DAYS))}
					and not exists (
						select from exemption_certificates c
						where c.producer_id = s.producer_id and c.store_id = s.id and c.state = 'handed-in')
				union all
				select 'promise-passed', p.store_id, p.promised_on, p.amount_cents
				from payment_promises p
				where p.producer_id = ${producerId} and p.state = 'open' and p.promised_on < ${today}
			) as found
			join stores s on s.producer_id = ${producerId} and s.id = found.store_id
			order by found.day, s.name, found.kind limit ${MOST}`)
	return rows
}
