import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { findStorePrices, type StoreProduct } from "~/services/pricing/find-store-prices.server"

/** What a store may put on its standing order, by the number it types for it. */
export function findProducts(query: { producerId: string; storeId: string; today: Day }): Promise<StoreProduct[]> {
	return readProducer(query.producerId, (tx) => findStorePrices(tx, query))
}
