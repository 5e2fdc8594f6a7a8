import type { Tx } from "~/db/transaction.server"
import { env } from "~/platform/env.server"
import type { InvoiceLeft } from "~/services/credits/read-invoice-left.server"
import { queueMails } from "~/services/mail/queue-mails.server"
import { findDeskPeople } from "~/services/orders/order-people.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"

/** What the desk is told of a report. */
type ToldReport = {
	producer: { id: string; slug: string }
	store: { name: string }
	person: { name: string }
	reportId: string
	note: string
	lines: readonly { invoiceLineId: string; pieces: number; photos: readonly unknown[] }[]
}

/** Tells the owners and desk hands of a report that was just made. */
export async function tellDesk(tx: Tx, report: ToldReport, invoice: InvoiceLeft): Promise<void> {
	const { producer, store, person, reportId, note } = report
	const yard = letterHead(await findYard(tx, producer.id))
	const named = new Map(invoice.lines.map((line) => [line.id, line]))
	const lines = report.lines.map(({ invoiceLineId, pieces, photos }) => ({
		productName: named.get(invoiceLineId)?.name ?? "",
		productNote: named.get(invoiceLineId)?.detail || null,
		pieces,
		photos: photos.length,
	}))
	const people = await findDeskPeople(tx, { producerId: producer.id })
	await queueMails(
		tx,
		producer.id,
		people.map(({ email }) => ({
			to: email,
			onceKey: `breakage:${reportId}`,
			template: "breakage-reported" as const,
			props: {
				yard,
				sentTo: email,
				storeName: store.name,
				invoiceNumber: invoice.number,
				personName: person.name,
				note: note || null,
				lines,
				reportUrl: `${env.BASE_URL}/desk/${producer.slug}/breakage/${reportId}`,
			},
		})),
	)
}
