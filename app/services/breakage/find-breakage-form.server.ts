import { eq, sql } from "drizzle-orm"
import { producerSettings } from "~/db/schema"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { reportableUntil } from "~/domain/credits/breakage-window"
import { type InvoiceLeft, type InvoiceLineLeft, readInvoiceLeft } from "~/services/credits/read-invoice-left.server"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { ReportState } from "./find-report.server"

/** A line of an invoice of which broken pieces can be reported. */
export type BreakableLine = {
	id: string
	code: string
	name: string
	detail: string
	sentPieces: number
	/** Sent, less what is credited and what waits in earlier reports. */
	leftPieces: number
	until: Day
}

/** A report that was made of the same invoice. */
export type EarlierReport = { id: string; reportedAt: Date; state: ReportState; pieces: number; acceptedPieces: number }

export type BreakageForm = {
	invoiceNumber: string
	/** In days after the delivery. */
	days: number
	lines: BreakableLine[]
	earlier: EarlierReport[]
	/** Whom to write to when it is too late to report here. */
	yard: { name: string; email: string; phone: string | null; contactName: string | null }
}

/** What a store can report of one of its invoices, and what it has reported. Null when it has no such invoice. */
export function findBreakageForm(query: {
	producerId: string
	storeId: string
	invoiceNumber: string
}): Promise<BreakageForm | null> {
	const { producerId, storeId, invoiceNumber } = query
	return readProducer(producerId, async (tx) => {
		const invoice = await readInvoiceLeft(tx, { producerId, storeId, number: invoiceNumber })
		if (!invoice) return null
		const days = await readBreakageDays(tx, producerId)
		const { rows } = await tx.execute<Omit<EarlierReport, "reportedAt"> & { reportedAt: string | Date }>(sql`
			select r.id, r.reported_at as "reportedAt", r.state, sum(l.pieces)::int as pieces,
				coalesce(sum(l.accepted_pieces), 0)::int as "acceptedPieces"
			from breakage_reports r
			join breakage_lines l on l.producer_id = r.producer_id and l.report_id = r.id
			where r.producer_id = ${producerId} and r.invoice_id = ${invoice.id}
			group by r.id, r.reported_at, r.state
			order by r.reported_at desc, r.id`)
		const earlier = rows.map((row) => ({ ...row, reportedAt: new Date(row.reportedAt) }))
		const yard = letterHead(await findYard(tx, producerId))
		return { invoiceNumber, days, lines: breakableLines(invoice, days), earlier, yard }
	})
}

/** Days after a delivery in which broken comb may be reported. */
export async function readBreakageDays(tx: Tx, producerId: string): Promise<number> {
	const [settings] = await tx
		.select({ days: producerSettings.breakageDays })
		.from(producerSettings)
		.where(eq(producerSettings.producerId, producerId))
	if (!settings) throw new Error("every producer has settings")
	return settings.days
}

/** The lines of an invoice that brought pieces, each with what can still be reported of it and until when. */
export function breakableLines(invoice: InvoiceLeft, days: number): BreakableLine[] {
	return invoice.lines.filter(({ sentPieces }) => sentPieces > 0).map((line) => breakableLine(line, days))
}

function breakableLine(line: InvoiceLineLeft, days: number): BreakableLine {
	const { id, code, name, detail, sentPieces, pieces, waitingPieces, deliveredOn } = line
	const leftPieces = Math.max(0, pieces - waitingPieces)
	return { id, code, name, detail, sentPieces, leftPieces, until: reportableUntil(deliveredOn, days) }
}
