import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** A product of the price list with what its case costs in each tier, by rising break. */
export type PricedProduct = {
	code: string
	name: string
	detail: string
	pieceNetGrams: number
	piecesPerCase: number
	breakFamily: string
	pieceCents: number | null
	tiers: { tierId: string; tierName: string; breaks: { minCases: number; caseCents: number }[] }[]
}

type Row = Omit<PricedProduct, "tiers"> & {
	tierId: string | null
	tierName: string | null
	breaks: { minCases: number; caseCents: number }[]
}

/** The price list in force on `today`: products by code, each with the tiers that have a price for it, by name. */
export function findPriceList(query: { producerId: string; today: Day }): Promise<PricedProduct[]> {
	const { producerId, today } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			with in_force as (
				select distinct on (r.product_id, r.tier_id, r.min_cases) r.product_id, r.tier_id, r.min_cases, r.case_cents
				from prices r
				where r.producer_id = ${producerId} and r.valid_from <= ${today}
				order by r.product_id, r.tier_id, r.min_cases, r.valid_from desc
			)
			select p.code, p.name, p.detail, p.piece_net_grams as "pieceNetGrams", p.pieces_per_case as "piecesPerCase",
				p.break_family as "breakFamily", p.piece_cents as "pieceCents", t.id as "tierId", t.name as "tierName",
				json_agg(json_build_object('minCases', f.min_cases, 'caseCents', f.case_cents) order by f.min_cases) as breaks
			from products p
			left join in_force f on f.product_id = p.id
			left join price_tiers t on t.producer_id = p.producer_id and t.id = f.tier_id
			where p.producer_id = ${producerId} and p.is_active
			group by p.id, p.code, p.name, p.detail, p.piece_net_grams, p.pieces_per_case, p.break_family, p.piece_cents, t.id, t.name
			order by length(p.code), p.code, t.name`)
		const products = new Map<string, PricedProduct>()
		for (const { tierId, tierName, breaks, ...product } of rows) {
			const known = products.get(product.code) ?? { ...product, tiers: [] }
			if (tierId !== null && tierName !== null) known.tiers.push({ tierId, tierName, breaks })
			products.set(product.code, known)
		}
		return [...products.values()]
	})
}
