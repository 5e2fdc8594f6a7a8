import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"

/** A report of broken comb that waits for the producer's answer. */
export type OpenReport = { id: string; storeName: string; invoiceNumber: string; reportedAt: Date; pieces: number }

const MOST = 50

/** The reports that wait for an answer, the longest waiting first, 50 at most: for the list of what is to do. */
export async function findOpenReports(tx: Tx, query: { producerId: string }): Promise<OpenReport[]> {
	const { rows } = await tx.execute<
		Omit<OpenReport, "invoiceNumber" | "reportedAt"> & { year: number; sequence: number; reportedAt: Date | string }
	>(sql`
		select r.id, s.name as "storeName", i.year, i.sequence, r.reported_at as "reportedAt",
			(select sum(b.pieces)::int from breakage_lines b where b.producer_id = r.producer_id and b.report_id = r.id) as pieces
		from breakage_reports r
		join stores s on s.producer_id = r.producer_id and s.id = r.store_id
		join invoices i on i.producer_id = r.producer_id and i.id = r.invoice_id
		where r.producer_id = ${query.producerId} and r.state = 'open'
		order by r.reported_at, r.id
		limit ${MOST}`)
	return rows.map(({ year, sequence, ...report }) => ({
		...report,
		reportedAt: new Date(report.reportedAt),
		invoiceNumber: invoiceNumber(year, sequence),
	}))
}
