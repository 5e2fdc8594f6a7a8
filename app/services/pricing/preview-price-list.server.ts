import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { PriceBook } from "~/domain/pricing/compare-prices"
import { type PricePreview, readPriceList } from "~/domain/pricing/read-price-list"
import type { Result } from "~/domain/result"
import { readOrderList } from "~/services/orders/read-order-list.server"
import { readPriceBook } from "./read-price-book.server"

/** A preview with the names of what it speaks of. */
export type NamedPreview = PricePreview & Pick<PriceBook, "products" | "tiers">

/**
 * What an uploaded price list would change, row by row; nothing is written or kept. Refused when the file is empty, above
 * 200 kB, or its first row does not name the columns.
 */
export async function previewPriceList(query: {
	producerId: string
	file: File
	today: Day
}): Promise<Result<{ preview: NamedPreview }, { ok: false; reason: "empty" | "too-large" | "no-columns" }>> {
	const list = await readOrderList(query.file)
	if (!list.ok) return list
	return readProducer(query.producerId, async (tx) => {
		const book = await readPriceBook(tx, query.producerId)
		const preview = readPriceList(list.cells, book, query.today)
		if (!preview) return { ok: false, reason: "no-columns" } as const
		return { ok: true, preview: { ...preview, products: book.products, tiers: book.tiers } } as const
	})
}
