import type { EarlierSale } from "~/services/stall/find-earlier-sale.server"
import { writtenBeforeWords } from "./sale-refusal-words"

/**
 * Where a sale that is written already is to be seen: an open card sale on its own page; all others are over, which a
 * new sale says.
 */
export function pageOfEarlier(base: string, saleId: string, dayId: string, earlier: EarlierSale): string {
	if (earlier.method === "card" && earlier.state === "open" && earlier.dayId === dayId) return `${base}/card/${saleId}`
	return `${base}?${new URLSearchParams({ done: writtenBeforeWords(earlier) })}`
}
