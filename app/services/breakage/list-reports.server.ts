import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { creditNumber } from "~/domain/credits/credit-number"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import type { ReportState } from "./find-report.server"

/** Which reports a list shows. */
export type ReportFilter = "all" | "open" | "answered"

export type ListedReport = {
	id: string
	state: ReportState
	storeName: string
	invoiceNumber: string
	reportedAt: Date
	pieces: number
	acceptedPieces: number
	photos: number
	/** The product of its first line, and how many lines follow. */
	firstName: string
	moreLines: number
	creditNumber: string | null
	creditCents: number | null
}

type Row = Omit<ListedReport, "invoiceNumber" | "creditNumber" | "reportedAt" | "firstName" | "moreLines"> & {
	key: string
	isOpen: boolean
	reportedAt: Date | string
	names: string[]
	invoiceYear: number
	invoiceSequence: number
	creditYear: number | null
	creditSequence: number | null
}

const PAGE = 30
const KEY = /^(open|answered)_(\d{4}-\d\d-\d\dT[\d:.]+Z)_([0-9a-f-]{36})$/

/**
 * Reports of broken comb, those without an answer first, each kind the latest first, 30 at a time; of the producer, or of
 * one store where `storeId` is given. `after` is the `next` of an earlier page; one that is malformed gives the first page.
 */
export function listReports(query: {
	producerId: string
	storeId: string | null
	filter: ReportFilter
	after: string | null
}): Promise<{ reports: ListedReport[]; next: string | null }> {
	const { producerId } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			with page as (
				(${part({ ...query, isOpen: true })}) union all (${part({ ...query, isOpen: false })})
				order by "isOpen" desc, reported_at desc, id desc limit ${PAGE + 1}
			)
			select p.id, p.state, p."isOpen", s.name as "storeName", p.reported_at as "reportedAt",
				to_char(p.reported_at at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.US"Z"') as key,
				i.year as "invoiceYear", i.sequence as "invoiceSequence", c.year as "creditYear", c.sequence as "creditSequence",
				c.total_cents as "creditCents", l.pieces, l.accepted as "acceptedPieces", l.names, l.photos
			from page p
			join stores s on s.producer_id = p.producer_id and s.id = p.store_id
			join invoices i on i.producer_id = p.producer_id and i.id = p.invoice_id
			left join credits c on c.producer_id = p.producer_id and c.id = p.credit_id
			cross join lateral (
				select sum(b.pieces)::int as pieces, coalesce(sum(b.accepted_pieces), 0)::int as accepted,
					array_agg(n.name order by n.position) as names,
					sum((select count(*) from breakage_photos x where x.producer_id = b.producer_id and x.line_id = b.id))::int as photos
				from breakage_lines b
				join invoice_lines n on n.producer_id = b.producer_id and n.id = b.invoice_line_id
				where b.producer_id = p.producer_id and b.report_id = p.id) l
			order by p."isOpen" desc, p.reported_at desc, p.id desc`)
		const reports = rows.slice(0, PAGE).map(listed)
		const last = rows[PAGE - 1]
		const next = rows.length > PAGE && last ? `${last.isOpen ? "open" : "answered"}_${last.key}_${last.id}` : null
		return { reports, next }
	})
}

function listed(row: Row): ListedReport {
	const { key: _, isOpen: __, names, invoiceYear, invoiceSequence, creditYear, creditSequence, ...facts } = row
	return {
		...facts,
		reportedAt: new Date(facts.reportedAt),
		invoiceNumber: invoiceNumber(invoiceYear, invoiceSequence),
		creditNumber: creditYear !== null && creditSequence !== null ? creditNumber(creditYear, creditSequence) : null,
		firstName: names[0] ?? "",
		moreLines: names.length - 1,
	}
}

/** One of the two kinds beyond the key, served by an index in its order; nothing where the filter or the key leaves it out. */
function part(query: {
	producerId: string
	storeId: string | null
	filter: ReportFilter
	after: string | null
	isOpen: boolean
}) {
	const { producerId, storeId, filter, isOpen } = query
	const [, standing, moment, id] = KEY.exec(query.after ?? "") ?? []
	const isLeftOut = filter === (isOpen ? "answered" : "open") || (isOpen && standing === "answered")
	const isKeyed = moment && id && (standing === "open") === isOpen
	const beyond = isKeyed ? sql`and (r.reported_at, r.id) < (${moment}::timestamptz, ${id}::uuid)` : sql``
	return sql`select r.*, ${isOpen}::boolean as "isOpen" from breakage_reports r
		where r.producer_id = ${producerId} ${storeId ? sql`and r.store_id = ${storeId}` : sql``}
			${isLeftOut ? sql`and false` : sql``} and ${isOpen ? sql`r.state = 'open'` : sql`r.state <> 'open'`} ${beyond}
		order by r.reported_at desc, r.id desc limit ${PAGE + 1}`
}
