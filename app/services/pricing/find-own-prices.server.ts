import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

type OwnPrice = {
	id: string
	storeName: string
	code: string
	productName: string
	minCases: number
	caseCents: number
	poundCents: number | null
	validFrom: Day
	validUntil: Day | null
}

type ListedPromotion = {
	id: string
	name: string
	code: string
	productName: string
	/** Null = every tier. */
	tierName: string | null
	basisPoints: number
	startsOn: Day
	endsOn: Day
}

/** What departs from the tiers, as far as it holds today or later, and what can be chosen for more of it. */
type OwnPrices = {
	own: OwnPrice[]
	promotions: ListedPromotion[]
	stores: { id: string; name: string; tierId: string }[]
	tiers: { id: string; name: string }[]
	products: { id: string; code: string; name: string; pricedBy: "case" | "weight" }[]
}

/** Prices of single stores, promotions, and each store's tier. */
export function findOwnPrices({ producerId, today }: { producerId: string; today: Day }): Promise<OwnPrices> {
	return readProducer(producerId, async (tx) => {
		const own = await tx.execute<OwnPrice>(sql`
			select o.id, s.name as "storeName", p.code, p.name as "productName", o.min_cases as "minCases",
				o.case_cents as "caseCents", o.pound_cents as "poundCents", o.valid_from::text as "validFrom",
				o.valid_until::text as "validUntil"
			from store_prices o
			join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			join products p on p.producer_id = o.producer_id and p.id = o.product_id
			where o.producer_id = ${producerId} and (o.valid_until is null or o.valid_until >= ${today})
			order by s.name, length(p.code), p.code, o.min_cases, o.valid_from`)
		const promotions = await tx.execute<ListedPromotion>(sql`
			select o.id, o.name, p.code, p.name as "productName", t.name as "tierName", o.basis_points as "basisPoints",
				o.starts_on::text as "startsOn", o.ends_on::text as "endsOn"
			from promotions o
			join products p on p.producer_id = o.producer_id and p.id = o.product_id
			left join price_tiers t on t.producer_id = o.producer_id and t.id = o.tier_id
			where o.producer_id = ${producerId} and o.ends_on >= ${today} order by o.starts_on, o.name, o.id`)
		const stores = await tx.execute<OwnPrices["stores"][number]>(sql`
			select id, name, tier_id as "tierId" from stores where producer_id = ${producerId} and is_active order by name, id`)
		const tiers = await tx.execute<OwnPrices["tiers"][number]>(sql`
			select id, name from price_tiers where producer_id = ${producerId} order by name`)
		const products = await tx.execute<OwnPrices["products"][number]>(sql`
			select id, code, name, priced_by as "pricedBy" from products
			where producer_id = ${producerId} and is_active order by length(code), code`)
		return {
			own: own.rows,
			promotions: promotions.rows,
			stores: stores.rows,
			tiers: tiers.rows,
			products: products.rows,
		}
	})
}
