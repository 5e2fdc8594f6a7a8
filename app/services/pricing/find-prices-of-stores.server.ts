import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { type StoreProduct, type StoreProductRow, storeProduct } from "./find-store-prices.server"

/**
 * What `findStorePrices` answers, for many stores in one statement and by store, of `productIds` alone; it locks nothing. A
 * store that may buy none of them is not among the answers.
 */
export async function findPricesOfStores(
	tx: Tx,
	query: { producerId: string; storeIds: readonly string[]; today: Day; productIds: readonly string[] },
): Promise<Map<string, StoreProduct[]>> {
	const { producerId, today } = query
	const productIds = sql`any(${sql.param([...query.productIds])}::uuid[])`
	const { rows } = await tx.execute<StoreProductRow & { store_id: string }>(sql`
		with asked as materialized (
			select s.id as store_id, s.tier_id from stores s
			where s.producer_id = ${producerId} and s.id = any(${sql.param([...query.storeIds])}::uuid[])
		), own as (
			select store_id, product_id, min_cases, case_cents, pound_cents from (
				select distinct on (r.store_id, r.product_id, r.min_cases) r.store_id, r.product_id, r.min_cases, r.case_cents,
					r.pound_cents, r.valid_until
				from store_prices r
				where r.producer_id = ${producerId} and r.store_id in (select store_id from asked)
					and r.product_id = ${productIds} and r.valid_from <= ${today}
				order by r.store_id, r.product_id, r.min_cases, r.valid_from desc
			) latest where valid_until is null or valid_until >= ${today}
		), of_tier as (
			select distinct on (r.tier_id, r.product_id, r.min_cases) r.tier_id, r.product_id, r.min_cases, r.case_cents,
				r.pound_cents
			from prices r
			where r.producer_id = ${producerId} and r.tier_id in (select tier_id from asked)
				and r.product_id = ${productIds} and r.valid_from <= ${today}
			order by r.tier_id, r.product_id, r.min_cases, r.valid_from desc
		), in_force as (
			select * from own
			union all
			select asked.store_id, t.product_id, t.min_cases, t.case_cents, t.pound_cents
			from asked join of_tier t on t.tier_id = asked.tier_id
			where not exists (select from own where own.store_id = asked.store_id and own.product_id = t.product_id)
		), breaks as (
			select store_id, product_id, array_agg(min_cases order by min_cases) as min_cases,
				array_agg(case_cents order by min_cases) as case_cents,
				array_agg(pound_cents order by min_cases) as pound_cents
			from in_force group by store_id, product_id
		), offs as (
			select asked.store_id, o.product_id, max(o.basis_points) as off
			from promotions o join asked on o.tier_id is null or o.tier_id = asked.tier_id
			where o.producer_id = ${producerId} and o.product_id = ${productIds}
				and ${today}::date between o.starts_on and o.ends_on
			group by asked.store_id, o.product_id
		)
		select breaks.store_id, p.id, p.code, p.name, p.detail, p.piece_net_grams, p.pieces_per_case, p.break_family,
			breaks.min_cases, breaks.case_cents, breaks.pound_cents, coalesce(offs.off, 0) as off
		from breaks
		join products p on p.producer_id = ${producerId} and p.id = breaks.product_id and p.is_active
		left join offs on offs.store_id = breaks.store_id and offs.product_id = p.id
		order by length(p.code), p.code`)
	const stores = new Map<string, StoreProduct[]>()
	for (const row of rows) {
		const products = stores.get(row.store_id)
		if (products) products.push(storeProduct(row))
		else stores.set(row.store_id, [storeProduct(row)])
	}
	return stores
}
