import { sql } from "drizzle-orm"
import { auditEntries, promotions } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { compareDays, type Day } from "~/domain/calendar"
import { type BookProduct, mayBeginOn, storedCents } from "~/domain/pricing/compare-prices"
import type { Result } from "~/domain/result"
import { lockProducts } from "~/services/orders/lock-products.server"

type By = { producerId: string; personId: string; now: Date; today: Day }
type Refusal = { ok: false; reason: "not-known" | "in-the-past" | "days-out-of-order" }

async function record(
	tx: Tx,
	by: By,
	entry: { action: string; subjectType: string; subjectId: string; detail: object },
) {
	await tx
		.insert(auditEntries)
		.values({ producerId: by.producerId, at: by.now, userId: by.personId, ...entry, detail: { ...entry.detail } })
}

function refuseDays(from: Day, until: Day | null, today: Day): Refusal | null {
	if (!mayBeginOn(from, today)) return { ok: false, reason: "in-the-past" }
	if (until !== null && compareDays(until, from) < 0) return { ok: false, reason: "days-out-of-order" }
	return null
}

/**
 * Sets a price for one store alone, from a day on and, if wanted, to a last day. `cents` is for a case, or a pound by
 * weight. Refused when it begins before today. One that was to begin on the same day is replaced; placed orders keep
 * their prices. Recorded.
 */
export function setStorePrice(
	query: By & {
		storeId: string
		productId: string
		minCases: number
		cents: number
		validFrom: Day
		validUntil: Day | null
	},
): Promise<Result<object, Refusal>> {
	const { producerId, storeId, productId, minCases, cents, validFrom, validUntil } = query
	return withProducer(producerId, async (tx) => {
		const refusal = refuseDays(validFrom, validUntil, query.today)
		if (refusal) return refusal
		await lockProducts(tx, { producerId, productIds: [productId] })
		const { rows } = await tx.execute<BookProduct>(sql`
			select p.id, p.code, p.name, p.piece_net_grams as "pieceNetGrams", p.pieces_per_case as "piecesPerCase",
				p.priced_by as "pricedBy"
			from products p join stores s on s.producer_id = p.producer_id and s.id = ${storeId}
			where p.producer_id = ${producerId} and p.id = ${productId}`)
		const product = rows[0]
		if (!product) return { ok: false, reason: "not-known" }
		const { caseCents, poundCents } = storedCents(product, cents)
		await tx.execute(sql`
			insert into store_prices
				(producer_id, id, store_id, product_id, min_cases, case_cents, pound_cents, valid_from, valid_until)
			values (${producerId}, gen_random_uuid(), ${storeId}, ${productId}, ${minCases}, ${caseCents}, ${poundCents},
				${validFrom}, ${validUntil})
			on conflict on constraint store_prices_break_once do update set case_cents = excluded.case_cents,
				pound_cents = excluded.pound_cents, valid_until = excluded.valid_until`)
		const detail = { productId, minCases, cents, validFrom, validUntil }
		await record(tx, query, { action: "set-store-price", subjectType: "store", subjectId: storeId, detail })
		return { ok: true }
	})
}

/**
 * Takes so much off a product between two days, for one tier or for all. Refused when it begins before today or ends before
 * it begins. Recorded.
 */
export function addPromotion(
	query: By & {
		name: string
		productId: string
		tierId: string | null
		basisPoints: number
		startsOn: Day
		endsOn: Day
	},
): Promise<Result<object, Refusal>> {
	const { producerId, name, productId, tierId, basisPoints, startsOn, endsOn } = query
	return withProducer(producerId, async (tx) => {
		const refusal = refuseDays(startsOn, endsOn, query.today)
		if (refusal) return refusal
		await lockProducts(tx, { producerId, productIds: [productId] })
		const { rows } = await tx.execute(sql`
			select 1 from products p where p.producer_id = ${producerId} and p.id = ${productId} and (${tierId}::uuid is null
				or exists (select from price_tiers t where t.producer_id = p.producer_id and t.id = ${tierId}::uuid))`)
		if (rows.length === 0) return { ok: false, reason: "not-known" }
		const row = { producerId, name, productId, tierId, basisPoints, startsOn, endsOn }
		await tx.insert(promotions).values(row)
		await record(tx, query, { action: "add-promotion", subjectType: "product", subjectId: productId, detail: row })
		return { ok: true }
	})
}

/** Gives a store another price tier, from its next order on; placed orders keep their prices. Recorded. */
export function setStoreTier(query: By & { storeId: string; tierId: string }): Promise<Result<object, Refusal>> {
	const { producerId, storeId, tierId } = query
	return withProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ before: string }>(sql`
			select s.tier_id as before from stores s join price_tiers t on t.producer_id = s.producer_id and t.id = ${tierId}
			where s.producer_id = ${producerId} and s.id = ${storeId} for no key update of s`)
		const before = rows[0]?.before
		if (before === undefined) return { ok: false, reason: "not-known" }
		if (before === tierId) return { ok: true }
		await tx.execute(sql`
			update stores set tier_id = ${tierId} where producer_id = ${producerId} and id = ${storeId}`)
		const detail = { from: before, to: tierId }
		await record(tx, query, { action: "set-store-tier", subjectType: "store", subjectId: storeId, detail })
		return { ok: true }
	})
}
