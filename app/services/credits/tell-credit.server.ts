import type { Tx } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findStorePeople } from "~/services/orders/order-people.server"
import { readCredit } from "./read-credit.server"

/** What the store is told beside the credit when it answers a report of broken comb. */
export type BreakageAnswer = {
	answer: string
	lines: { productName: string; productNote: string | null; reported: number; accepted: number }[]
}

/** Mails a credit that was just issued, with its PDF, to the people of the store who are told of invoices. */
export async function tellCredit(
	tx: Tx,
	query: {
		producer: { id: string; slug: string }
		store: { id: string; slug: string }
		number: string
		breakage: BreakageAnswer | null
	},
): Promise<void> {
	const { producer, store, number, breakage } = query
	const credit = await readCredit(tx, { producerId: producer.id, storeId: store.id, number })
	if (!credit) throw new Error("the credit has just been written")
	const page = `${env.BASE_URL}/buy/${producer.slug}/${store.slug}/credits/${number}`
	const people = await findStorePeople(tx, { producerId: producer.id, storeId: store.id, kind: "invoices" })
	await queueMails(
		tx,
		producer.id,
		people.map(({ email }) => ({
			to: email,
			onceKey: `credit:${number}`,
			template: "credit-issued" as const,
			props: { credit, breakage, sentTo: email, creditUrl: page, pdfUrl: `${page}.pdf` },
		})),
	)
}
