import { sql } from "drizzle-orm"
import { breaksConstraint } from "~/db/errors.server"
import { auditEntries, storeRounds, stores } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"
import { columnsOf, hasTier, type StoreTerms } from "./store-terms.server"

export type AddRefusal = { ok: false; reason: "slug-taken" | "no-such-tier" | "no-such-round" }

/**
 * Adds a store with its terms and the rounds that stop there. `storeId` is made with the form: sent twice it is one store.
 * Refused when its name in addresses is taken. Recorded.
 */
export async function addStore(query: {
	producerId: string
	storeId: string
	slug: string
	personId: string
	terms: StoreTerms
	roundIds: readonly string[]
}): Promise<Result<object, AddRefusal>> {
	const { producerId, storeId, slug, personId, terms, roundIds } = query
	try {
		return await withProducer<Result<object, AddRefusal>>(producerId, async (tx) => {
			if (!(await hasTier(tx, { producerId, tierId: terms.tierId }))) return { ok: false, reason: "no-such-tier" }
			const added = await tx
				.insert(stores)
				.values({ producerId, id: storeId, slug, ...columnsOf(terms) })
				.onConflictDoNothing({ target: [stores.producerId, stores.id] })
				.returning({ id: stores.id })
			if (added.length === 0) return { ok: true }
			if (roundIds.length > 0)
				await tx.insert(storeRounds).values(roundIds.map((roundId) => ({ producerId, storeId, roundId })))
			await tx.insert(auditEntries).values({
				producerId,
				userId: personId,
				action: "store added",
				subjectType: "store",
				subjectId: storeId,
				detail: { slug, ...terms, roundIds },
			})
			return { ok: true }
		})
	} catch (error) {
		if (breaksConstraint(error, "stores_slug_once")) return { ok: false, reason: "slug-taken" }
		if (breaksConstraint(error, "store_rounds_round")) return { ok: false, reason: "no-such-round" }
		throw error
	}
}

/** What a store can be given: price tiers, the rounds of the van, the places of the tax table. */
export type StoreChoices = {
	tiers: { id: string; name: string }[]
	rounds: { id: string; name: string; weekday: number }[]
	taxPlaces: string[]
}

/** Reads what a store can be given. */
export function findStoreChoices(query: { producerId: string }): Promise<StoreChoices> {
	const { producerId } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<StoreChoices>(sql`
			select coalesce((
					select json_agg(json_build_object('id', t.id, 'name', t.name) order by t.name)
					from price_tiers t where t.producer_id = ${producerId}
				), '[]'::json) as tiers,
				coalesce((
					select json_agg(json_build_object('id', r.id, 'name', r.name, 'weekday', r.weekday) order by r.weekday)
					from delivery_rounds r where r.producer_id = ${producerId}
				), '[]'::json) as rounds,
				array(
					select distinct r.place from tax_rates r where r.producer_id = ${producerId} order by r.place
				) as "taxPlaces"`)
		return rows[0] as StoreChoices
	})
}
