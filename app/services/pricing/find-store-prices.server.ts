import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { caseCentsAfter } from "~/domain/pricing/price-in-force"
import type { CaseBreak } from "~/domain/pricing/price-order"

/**
 * A product as one store buys it: what a case holds and costs, with what a promotion takes off. Breaks rise by `minCases`.
 * A case of comb priced by weight is an estimate from its nominal net weight.
 */
export type StoreProduct = {
	productId: string
	code: string
	name: string
	detail: string
	pieceNetGrams: number
	piecesPerCase: number
	breakFamily: string
	breaks: CaseBreak[]
}

/** A product with the prices in force for one store, as a statement gives it. */
export type StoreProductRow = {
	id: string
	code: string
	name: string
	detail: string
	piece_net_grams: number
	pieces_per_case: number
	break_family: string
	min_cases: number[]
	case_cents: number[]
	pound_cents: (number | null)[]
	off: number
}

/**
 * The products that a store may buy, by their code, with the breaks in force for it on `today`, by the rules of
 * `breaksForStore` and `promotionInForce`: the store's own price before its tier's, of each break the latest that has
 * begun, and the largest promotion of the day off. A product without a price for the store, or no longer sold, is not among
 * them. One statement for all products or for `productIds` alone; `lock` takes these products' rows first, in the order of
 * their ids, so that whoever else places an order with one of them waits until this transaction ends.
 */
export async function findStorePrices(
	tx: Tx,
	query: { producerId: string; storeId: string; today: Day; productIds?: readonly string[]; lock?: boolean },
): Promise<StoreProduct[]> {
	const { producerId, storeId, today } = query
	const only = query.productIds ? sql`and p.id = any(${sql.param(query.productIds)}::uuid[])` : sql``
	const { rows } = await tx.execute<StoreProductRow>(sql`
		with sold as materialized (
			select p.id, p.code, p.name, p.detail, p.piece_net_grams, p.pieces_per_case, p.break_family
			from products p
			where p.producer_id = ${producerId} and p.is_active ${only}
			order by p.id ${query.lock ? sql`for no key update` : sql``}
		), own as (
			select product_id, min_cases, case_cents, pound_cents from (
				select distinct on (r.product_id, r.min_cases) r.product_id, r.min_cases, r.case_cents, r.pound_cents, r.valid_until
				from store_prices r
				where r.producer_id = ${producerId} and r.store_id = ${storeId} and r.valid_from <= ${today}
				order by r.product_id, r.min_cases, r.valid_from desc
			) latest where valid_until is null or valid_until >= ${today}
		), of_tier as (
			select distinct on (r.product_id, r.min_cases) r.product_id, r.min_cases, r.case_cents, r.pound_cents
			from stores s
			join prices r on r.producer_id = s.producer_id and r.tier_id = s.tier_id
			where s.producer_id = ${producerId} and s.id = ${storeId} and r.valid_from <= ${today}
			order by r.product_id, r.min_cases, r.valid_from desc
		), in_force as (
			select * from own
			union all
			select * from of_tier where not exists (select from own where own.product_id = of_tier.product_id)
		), breaks as (
			select product_id, array_agg(min_cases order by min_cases) as min_cases,
				array_agg(case_cents order by min_cases) as case_cents,
				array_agg(pound_cents order by min_cases) as pound_cents
			from in_force group by product_id
		), offs as (
			select o.product_id, max(o.basis_points) as off
			from promotions o
			join stores s on s.producer_id = o.producer_id and s.id = ${storeId}
			where o.producer_id = ${producerId} and (o.tier_id is null or o.tier_id = s.tier_id)
				and ${today}::date between o.starts_on and o.ends_on
			group by o.product_id
		)
		select sold.*, breaks.min_cases, breaks.case_cents, breaks.pound_cents, coalesce(offs.off, 0) as off
		from sold join breaks on breaks.product_id = sold.id left join offs on offs.product_id = sold.id
		order by length(sold.code), sold.code`)
	return rows.map(storeProduct)
}

/** The product as its store buys it, with what a promotion takes off each of its breaks. */
export function storeProduct(row: StoreProductRow): StoreProduct {
	return {
		productId: row.id,
		code: row.code,
		name: row.name,
		detail: row.detail,
		pieceNetGrams: row.piece_net_grams,
		piecesPerCase: row.pieces_per_case,
		breakFamily: row.break_family,
		breaks: row.min_cases.map((minCases, index) => ({ minCases, ...priceAt(row, index) })),
	}
}

function priceAt(row: StoreProductRow, index: number): { caseCents: number; poundCents: number | null } {
	const price = { caseCents: row.case_cents[index] ?? 0, poundCents: row.pound_cents[index] ?? null }
	const sizes = { pieceNetGrams: row.piece_net_grams, piecesPerCase: row.pieces_per_case }
	return caseCentsAfter(price, sizes, row.off)
}
