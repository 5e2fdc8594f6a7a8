import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { DeliveryTerms } from "~/domain/pricing/price-order"

/** What placing an order needs to know of a store, and whether this very form was sent before. */
export type PlacingFacts = {
	storeName: string
	storeSlug: string
	producerSlug: string
	zone: string
	terms: DeliveryTerms
	/** How the producer names itself in letters. */
	yard: { name: string; address: string; email: string; phone: string | null; contactName: string | null }
	/** The order that an earlier send of the same form made. */
	earlier: { id: string; number: number } | null
}

type Row = {
	store_name: string
	store_slug: string
	producer_slug: string
	time_zone: string
	minimum_cents: number
	delivery_charge_cents: number
	free_above_cents: number | null
	producer_name: string
	address: string
	email: string
	phone: string
	contact_name: string
	earlier_id: string | null
	earlier_number: number
}

const FACTS = sql`s.name as store_name, s.slug as store_slug, p.slug as producer_slug, p.time_zone,
			s.minimum_cents, s.delivery_charge_cents, s.free_above_cents,
			p.name as producer_name, ps.address, ps.email, ps.phone, ps.contact_name,
			o.id as earlier_id, o.number as earlier_number`

/** One statement. Throws when there is no such store, or the producer has no settings. */
export async function findPlacingFacts(
	tx: Tx,
	query: { producerId: string; storeId: string; idempotencyKey: string },
): Promise<PlacingFacts> {
	const { rows } = await tx.execute<Row>(sql`
		select ${FACTS}
		from stores s
		join producers p on p.id = s.producer_id
		join producer_settings ps on ps.producer_id = s.producer_id
		left join orders o on o.producer_id = s.producer_id and o.store_id = s.id
			and o.idempotency_key = ${query.idempotencyKey}
		where s.producer_id = ${query.producerId} and s.id = ${query.storeId}`)
	const [row] = rows
	if (!row) throw new Error("an order is placed for a store of a producer with settings")
	return factsOf(row)
}

/** The same for many orders in one statement, by the key of each. A store that is not there is left out. */
export async function findPlacingFactsOf(
	tx: Tx,
	query: { producerId: string; asked: readonly { storeId: string; idempotencyKey: string }[] },
): Promise<Map<string, PlacingFacts>> {
	const { producerId, asked } = query
	const { rows } = await tx.execute<Row & { key: string }>(sql`
		select asked.key, ${FACTS}
		from unnest(${sql.param(asked.map(({ storeId }) => storeId))}::uuid[],
			${sql.param(asked.map(({ idempotencyKey }) => idempotencyKey))}::uuid[]) as asked(store_id, key)
		join stores s on s.producer_id = ${producerId} and s.id = asked.store_id
		join producers p on p.id = s.producer_id
		join producer_settings ps on ps.producer_id = s.producer_id
		left join orders o on o.producer_id = s.producer_id and o.store_id = s.id and o.idempotency_key = asked.key`)
	return new Map(rows.map((row) => [row.key, factsOf(row)]))
}

function factsOf(row: Row): PlacingFacts {
	return {
		storeName: row.store_name,
		storeSlug: row.store_slug,
		producerSlug: row.producer_slug,
		zone: row.time_zone,
		terms: {
			minimumCents: row.minimum_cents,
			deliveryChargeCents: row.delivery_charge_cents,
			freeAboveCents: row.free_above_cents,
		},
		yard: {
			name: row.producer_name,
			address: row.address,
			email: row.email,
			phone: row.phone || null,
			contactName: row.contact_name || null,
		},
		earlier: row.earlier_id === null ? null : { id: row.earlier_id, number: row.earlier_number },
	}
}
