import { readProducer } from "~/db/transaction.server"
import type { PriceBook } from "~/domain/pricing/compare-prices"
import { readPriceBook } from "./read-price-book.server"

/** Products, tiers and prices, for the form that sets a price. */
export function findPriceForm(producerId: string): Promise<PriceBook> {
	return readProducer(producerId, (tx) => readPriceBook(tx, producerId))
}
