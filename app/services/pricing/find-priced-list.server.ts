import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CaseBreak } from "~/domain/pricing/price-order"
import { findStorePrices } from "./find-store-prices.server"

/** A price list that is handed out: of a tier, or of one store with what is its own. */
export type PricedList = {
	/** The producer and how to reach it. */
	yard: { name: string; address: string; email: string; phone: string }
	/** The tier or the store that it is for. */
	forName: string
	day: Day
	products: {
		code: string
		name: string
		detail: string
		pieceNetGrams: number
		piecesPerCase: number
		breakFamily: string
		breaks: CaseBreak[]
		/** By rising break, for a product priced by weight; the case is then an estimate. */
		poundCents: number[] | null
	}[]
}

type TierRow = PricedList["products"][number]

function readYard(tx: Tx, producerId: string) {
	return tx.execute<PricedList["yard"]>(sql`
		select p.name, s.address, s.email, s.phone
		from producers p join producer_settings s on s.producer_id = p.id where p.id = ${producerId}`)
}

/** The prices of a tier that hold on `day`, without promotions, by the products' codes. Null where there is no such tier. */
export function findTierList(query: { producerId: string; tierId: string; day: Day }): Promise<PricedList | null> {
	const { producerId, tierId, day } = query
	return readProducer(producerId, async (tx) => {
		const tiers = await tx.execute<{ name: string }>(sql`
			select name from price_tiers where producer_id = ${producerId} and id = ${tierId}`)
		const [yard] = (await readYard(tx, producerId)).rows
		const tier = tiers.rows[0]
		if (!tier || !yard) return null
		const { rows } = await tx.execute<TierRow>(sql`
			with in_force as (
				select distinct on (product_id, min_cases) product_id, min_cases, case_cents, pound_cents
				from prices where producer_id = ${producerId} and tier_id = ${tierId} and valid_from <= ${day}
				order by product_id, min_cases, valid_from desc
			)
			select p.code, p.name, p.detail, p.piece_net_grams as "pieceNetGrams", p.pieces_per_case as "piecesPerCase",
				p.break_family as "breakFamily",
				json_agg(json_build_object('minCases', f.min_cases, 'caseCents', f.case_cents) order by f.min_cases) as breaks,
				case when p.priced_by = 'weight' then json_agg(f.pound_cents order by f.min_cases) end as "poundCents"
			from products p join in_force f on f.product_id = p.id
			where p.producer_id = ${producerId} and p.is_active
			group by p.producer_id, p.id
			order by length(p.code), p.code`)
		return { yard, forName: tier.name, day, products: rows }
	})
}

/** What one store pays on `day`: its own prices and promotions included. A case by weight is an estimate. */
export function findStoreList(query: {
	producerId: string
	store: { id: string; name: string }
	day: Day
}): Promise<PricedList | null> {
	const { producerId, store, day } = query
	return readProducer(producerId, async (tx) => {
		const [yard] = (await readYard(tx, producerId)).rows
		if (!yard) return null
		const products = await findStorePrices(tx, { producerId, storeId: store.id, today: day })
		return {
			yard,
			forName: store.name,
			day,
			products: products.map((product) => ({ ...product, poundCents: poundsOf(product) })),
		}
	})
}

/** The prices of a pound at each break; null where the product is priced by the case. */
function poundsOf({ breaks }: { breaks: readonly CaseBreak[] }): number[] | null {
	return breaks[0]?.poundCents == null ? null : breaks.map(({ poundCents }) => poundCents ?? 0)
}
