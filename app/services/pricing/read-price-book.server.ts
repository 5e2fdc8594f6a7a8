import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { BookProduct, PriceBook } from "~/domain/pricing/compare-prices"

/** Products that are sold, tiers by name, and every price of a tier with its day, those to come included. */
export async function readPriceBook(tx: Tx, producerId: string): Promise<PriceBook> {
	const products = await tx.execute<BookProduct>(sql`
		select id, code, name, piece_net_grams as "pieceNetGrams", pieces_per_case as "piecesPerCase", priced_by as "pricedBy"
		from products where producer_id = ${producerId} and is_active order by length(code), code`)
	const tiers = await tx.execute<PriceBook["tiers"][number]>(sql`
		select id, name from price_tiers where producer_id = ${producerId} order by name`)
	const prices = await tx.execute<PriceBook["prices"][number]>(sql`
		select tier_id as "tierId", product_id as "productId", min_cases as "minCases", case_cents as "caseCents",
			pound_cents as "poundCents", valid_from::text as "validFrom"
		from prices where producer_id = ${producerId}`)
	return { products: products.rows, tiers: tiers.rows, prices: prices.rows }
}
