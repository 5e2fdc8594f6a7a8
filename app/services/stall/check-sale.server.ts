import { withProducer } from "~/db/transaction.server"
import { findCardOutcome } from "~/platform/card-outcome.server"
import { isAskingForCard } from "~/platform/card-reader.server"
import { log } from "~/platform/log.server"
import { findMarketDay, type StallViewer } from "./find-market-days.server"
import { findOpenSale } from "./find-open-sale.server"
import { settleSale } from "./settle-sale.server"

/**
 * Asks the payment service now what became of an open card sale, for when its event is slow to come: `settled` when there
 * is something new to see, also for a sale that waits for nothing; `waiting` while the reader asks for the card; `off-reader`
 * when it does not, though the sale is open; `no-answer` when the service gave none.
 */
export async function checkSale(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
}): Promise<"settled" | "waiting" | "off-reader" | "no-answer"> {
	const { producerId, saleId } = query
	const found = await withProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		const sale = day ? await findOpenSale(tx, query) : undefined
		return day && sale ? { readerId: day.readerId, intentId: sale.stripePaymentIntentId } : null
	})
	if (!found) return "settled"
	const { readerId, intentId } = found
	if (!intentId) return "off-reader"
	try {
		const outcome = await findCardOutcome({ intentId })
		await withProducer(producerId, (tx) => settleSale(tx, { producerId, saleId, outcome }))
		if (outcome.state === "paid" || outcome.state === "declined") return "settled"
		return (await isAskingForCard({ readerId, intentId })) ? "waiting" : "off-reader"
	} catch (error) {
		log.warn({ err: error, saleId }, "the payment service does not say what became of a sale")
		return "no-answer"
	}
}
