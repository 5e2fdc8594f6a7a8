import type { Tx } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findStorePeople } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { BreakageReport } from "./find-report.server"

/** Tells the people of the store that their report gives no credit, with the producer's sentence. */
export async function tellDeclined(
	tx: Tx,
	query: { producer: { id: string; slug: string }; report: BreakageReport; answer: string },
): Promise<void> {
	const { producer, report, answer } = query
	const yard = letterHead(await findYard(tx, producer.id))
	const people = await findStorePeople(tx, { producerId: producer.id, storeId: report.storeId, kind: "invoices" })
	await queueMails(
		tx,
		producer.id,
		people.map(({ email }) => ({
			to: email,
			onceKey: `breakage-declined:${report.id}`,
			template: "breakage-declined" as const,
			props: {
				yard,
				sentTo: email,
				storeName: report.storeName,
				invoiceNumber: report.invoiceNumber,
				answer,
				lines: report.lines.map(({ name, detail, pieces }) => ({
					productName: name,
					productNote: detail || null,
					reported: pieces,
				})),
				reportUrl: `${env.BASE_URL}/buy/${producer.slug}/${report.storeSlug}/breakage/${report.id}`,
			},
		})),
	)
}
