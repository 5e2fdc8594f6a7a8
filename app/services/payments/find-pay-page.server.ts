import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { discountOn } from "~/domain/payments/lay-payment"
import { readPayable } from "./read-payable.server"
import { leftToPay } from "./visits.server"

/** An open invoice as a store can pay it today. `leftCents` is what is to be paid, less discount and debits on their way. */
export type PayableLine = {
	number: string
	dueOn: Day
	openCents: number
	onItsWayCents: number
	discountCents: number
	discountUntil: Day | null
	leftCents: number
}

/** How a store pays: what is kept, and whether what falls due is taken by itself. */
export type WayToPay = { keptWords: string; isAutomatic: boolean }

/** What a store may pay today, the invoice due first before the later, and the way to pay that it keeps. */
export function findPayPage(query: {
	producerId: string
	storeId: string
	today: Day
}): Promise<{ invoices: PayableLine[]; way: WayToPay }> {
	const { producerId, storeId, today } = query
	return readProducer(producerId, async (tx) => {
		const open = await readPayable(tx, query)
		const { rows } = await tx.execute<WayToPay>(sql`
			select pays_with_words as "keptWords", pays_automatically as "isAutomatic" from stores
			where producer_id = ${producerId} and id = ${storeId}`)
		return {
			way: rows[0] ?? { keptWords: "", isAutomatic: false },
			invoices: open.map((invoice) => ({
				number: invoice.number,
				dueOn: invoice.dueOn,
				openCents: invoice.openCents,
				onItsWayCents: invoice.onItsWayCents,
				discountCents: invoice.onItsWayCents > 0 ? 0 : discountOn(invoice, today),
				discountUntil: invoice.discountUntil,
				leftCents: leftToPay(invoice, today),
			})),
		}
	})
}
