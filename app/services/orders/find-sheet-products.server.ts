import { readProducer } from "~/db/transaction.server"
import { dayInZone } from "~/domain/calendar"
import { findStorePrices, type StoreProduct } from "~/services/pricing/find-store-prices.server"

/** The products that a store may order, by code: what the rows of a list are matched with. */
export function findSheetProducts(query: {
	producerId: string
	storeId: string
	now: Date
	zone: string
}): Promise<StoreProduct[]> {
	const { producerId, storeId, now, zone } = query
	return readProducer(producerId, (tx) => findStorePrices(tx, { producerId, storeId, today: dayInZone(now, zone) }))
}
