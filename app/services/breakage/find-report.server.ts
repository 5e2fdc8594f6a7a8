import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { creditNumber } from "~/domain/credits/credit-number"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"

export type ReportState = "open" | "accepted" | "part-accepted" | "declined"

/** A report of broken comb as its pages show it. */
export type BreakageReport = {
	id: string
	state: ReportState
	storeId: string
	storeSlug: string
	storeName: string
	invoiceNumber: string
	note: string
	answer: string
	reportedBy: string
	reportedAt: Date
	answeredBy: string | null
	answeredAt: Date | null
	creditNumber: string | null
	lines: ReportLine[]
}

export type ReportLine = {
	id: string
	invoiceLineId: string
	code: string
	name: string
	detail: string
	lotCodes: string
	pieces: number
	note: string
	acceptedPieces: number | null
	photoIds: string[]
}

type Head = Omit<BreakageReport, "lines" | "invoiceNumber" | "creditNumber" | "reportedAt" | "answeredAt"> & {
	reportedAt: Date | string
	answeredAt: Date | string | null
	invoiceYear: number
	invoiceSequence: number
	creditYear: number | null
	creditSequence: number | null
}

/** One report, in a transaction of its own; with `storeId` it must be that store's. Null when there is none. */
export function findReport(query: {
	producerId: string
	storeId?: string
	reportId: string
}): Promise<BreakageReport | null> {
	return readProducer(query.producerId, (tx) => readReport(tx, query))
}

/** The same inside a transaction. Two statements. */
export async function readReport(
	tx: Tx,
	query: { producerId: string; storeId?: string; reportId: string },
): Promise<BreakageReport | null> {
	const { producerId, storeId, reportId } = query
	const { rows } = await tx.execute<Head>(sql`
		select r.id, r.state, r.note, r.answer, r.reported_at as "reportedAt", r.answered_at as "answeredAt",
			s.id as "storeId", s.slug as "storeSlug", s.name as "storeName", i.year as "invoiceYear",
			i.sequence as "invoiceSequence", c.year as "creditYear", c.sequence as "creditSequence",
			coalesce(who.name, 'someone') as "reportedBy", by.name as "answeredBy"
		from breakage_reports r
		join stores s on s.producer_id = r.producer_id and s.id = r.store_id
		join invoices i on i.producer_id = r.producer_id and i.id = r.invoice_id
		left join credits c on c.producer_id = r.producer_id and c.id = r.credit_id
		left join users who on who.id = r.reported_by
		left join users by on by.id = r.answered_by
		where r.producer_id = ${producerId} and r.id = ${reportId} ${storeId ? sql`and r.store_id = ${storeId}` : sql``}`)
	const [head] = rows
	if (!head) return null
	const { invoiceYear, invoiceSequence, creditYear, creditSequence, ...facts } = head
	const { rows: lines } = await tx.execute<ReportLine>(sql`
		select b.id, b.invoice_line_id as "invoiceLineId", l.code, l.name, l.detail, l.lot_codes as "lotCodes", b.pieces,
			b.note, b.accepted_pieces as "acceptedPieces",
			array(select p.id::text from breakage_photos p where p.producer_id = b.producer_id and p.line_id = b.id
				order by p.position) as "photoIds"
		from breakage_lines b
		join invoice_lines l on l.producer_id = b.producer_id and l.id = b.invoice_line_id
		where b.producer_id = ${producerId} and b.report_id = ${reportId}
		order by l.position`)
	return {
		...facts,
		reportedAt: new Date(facts.reportedAt),
		answeredAt: facts.answeredAt === null ? null : new Date(facts.answeredAt),
		invoiceNumber: invoiceNumber(invoiceYear, invoiceSequence),
		creditNumber: creditYear !== null && creditSequence !== null ? creditNumber(creditYear, creditSequence) : null,
		lines,
	}
}
