import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CaseBreak } from "~/domain/pricing/price-order"

/** A product as one store buys it: what a case holds and costs. Breaks rise by `minCases`. */
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

type Row = {
	id: string
	code: string
	name: string
	detail: string
	piece_net_grams: number
	pieces_per_case: number
	break_family: string
	min_cases: number[]
	case_cents: number[]
}

/**
 * The products that a store may buy, by their code, with the breaks of its price tier in force on `today`: of each break
 * the latest that has begun. A product without a price in the tier, or no longer sold, is not among them. One statement
 * for all products or for `productIds` alone; `lock` takes these products' rows first, in the order of their ids, so
 * that whoever else places an order with one of them waits until this transaction ends.
 */
export async function findStorePrices(
	tx: Tx,
	query: { producerId: string; storeId: string; today: Day; productIds?: readonly string[]; lock?: boolean },
): Promise<StoreProduct[]> {
	const { producerId, storeId, today } = query
	const only = query.productIds ? sql`and p.id = any(${sql.param(query.productIds)}::uuid[])` : sql``
	const { rows } = await tx.execute<Row>(sql`
		with sold as materialized (
			select p.id, p.code, p.name, p.detail, p.piece_net_grams, p.pieces_per_case, p.break_family
			from products p
			where p.producer_id = ${producerId} and p.is_active ${only}
			order by p.id ${query.lock ? sql`for no key update` : sql``}
		), in_force as (
			select distinct on (r.product_id, r.min_cases) r.product_id, r.min_cases, r.case_cents
			from stores s
			join prices r on r.producer_id = s.producer_id and r.tier_id = s.tier_id
			where s.producer_id = ${producerId} and s.id = ${storeId} and r.valid_from <= ${today}
			order by r.product_id, r.min_cases, r.valid_from desc
		), breaks as (
			select product_id, array_agg(min_cases order by min_cases) as min_cases,
				array_agg(case_cents order by min_cases) as case_cents
			from in_force group by product_id
		)
		select sold.*, breaks.min_cases, breaks.case_cents
		from sold join breaks on breaks.product_id = sold.id
		order by length(sold.code), sold.code`)
	return rows.map((row) => ({
		productId: row.id,
		code: row.code,
		name: row.name,
		detail: row.detail,
		pieceNetGrams: row.piece_net_grams,
		piecesPerCase: row.pieces_per_case,
		breakFamily: row.break_family,
		breaks: row.min_cases.map((minCases, index) => ({ minCases, caseCents: row.case_cents[index] ?? 0 })),
	}))
}
