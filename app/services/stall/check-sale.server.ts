import { withProducer } from "~/db/transaction.server"
import { findCardOutcome } from "~/platform/card-outcome.server"
import { log } from "~/platform/log.server"
import { findMarketDay, type StallViewer } from "./find-market-days.server"
import { findOpenSale } from "./find-open-sale.server"
import { settleSale } from "./settle-sale.server"

/**
 * Asks the payment service now what became of an open card sale, for when its event is slow to come. Answers false when
 * there was no answer. A sale that is settled, or is not theirs, needs no asking.
 */
export async function checkSale(query: {
	producerId: string
	dayId: string
	viewer: StallViewer
	saleId: string
}): Promise<boolean> {
	const { producerId, saleId } = query
	const intentId = await withProducer(producerId, async (tx) => {
		const day = await findMarketDay(tx, query)
		return day ? ((await findOpenSale(tx, query))?.stripePaymentIntentId ?? null) : null
	})
	if (!intentId) return true
	try {
		const outcome = await findCardOutcome({ intentId })
		await withProducer(producerId, (tx) => settleSale(tx, { producerId, saleId, outcome }))
		return true
	} catch (error) {
		log.warn({ err: error, saleId }, "the payment service does not say what became of a sale")
		return false
	}
}
