import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { DifferenceKind } from "~/domain/payments/stripe-difference"

export type OpenDifference = {
	id: string
	kind: DifferenceKind
	stripeId: string
	ourCents: number | null
	theirCents: number | null
	detail: string
	foundAt: Date
	/** The payment here that it is about; null where there is none. */
	paymentId: string | null
}

const MOST = 200

/** Where payments stand otherwise here than at Stripe, the oldest first; the first two hundred. */
export function listDifferences(query: { producerId: string }): Promise<OpenDifference[]> {
	return readProducer(query.producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<OpenDifference, "foundAt"> & { foundAt: string }>(sql`
			select d.id, d.kind, d.stripe_id as "stripeId", d.our_cents as "ourCents", d.their_cents as "theirCents", d.detail,
				d.found_at::text as "foundAt", p.id as "paymentId"
			from stripe_differences d
			left join payments p on p.producer_id = d.producer_id and p.stripe_payment_intent_id = d.stripe_id
			where d.producer_id = ${query.producerId} and d.settled_at is null
			order by d.found_at, d.id limit ${MOST}`)
		return rows.map((row) => ({ ...row, foundAt: new Date(row.foundAt) }))
	})
}
