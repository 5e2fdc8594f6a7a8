import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { CreditableLine } from "~/domain/credits/plan-credit"
import { parseInvoiceNumber } from "~/domain/invoicing/invoice-number"

/** An invoice with what of it can still be credited. */
export type InvoiceLeft = {
	id: string
	number: string
	storeId: string
	storeSlug: string
	storeName: string
	issuedOn: Day
	totalCents: number
	/** Invoiced less credited before, whatever has been paid. */
	leftCents: number
	openCents: number
	lines: InvoiceLineLeft[]
}

/** A line of it; `pieces`, `lineCents` and `taxCents` are what is left after earlier credits. */
export type InvoiceLineLeft = CreditableLine & {
	orderLineId: string | null
	code: string
	name: string
	detail: string
	sentPieces: number
	invoicedCents: number
	/** Pieces in reports that wait for an answer. */
	waitingPieces: number
	/** The delivery day of its order, or the day of the invoice where it names no order. */
	deliveredOn: Day
}

type Head = Omit<InvoiceLeft, "lines" | "number" | "leftCents"> & { creditedCents: number }

/**
 * What of an invoice can still be credited, by its printed number; with `storeId` it must be that store's. Null when there
 * is none. Two statements, whatever the number of lines.
 */
export async function readInvoiceLeft(
	tx: Tx,
	query: { producerId: string; storeId?: string; number: string },
): Promise<InvoiceLeft | null> {
	const { producerId, storeId, number } = query
	const named = parseInvoiceNumber(number)
	if (!named) return null
	const { rows } = await tx.execute<Head>(sql`
		select i.id, s.id as "storeId", s.slug as "storeSlug", s.name as "storeName", i.issued_on::text as "issuedOn",
			i.total_cents as "totalCents", i.open_cents as "openCents",
			(select coalesce(sum(c.total_cents), 0)::int from credits c
				where c.producer_id = i.producer_id and c.invoice_id = i.id) as "creditedCents"
		from invoices i join stores s on s.producer_id = i.producer_id and s.id = i.store_id
		where i.producer_id = ${producerId} and i.year = ${named.year} and i.sequence = ${named.sequence}
			${storeId ? sql`and i.store_id = ${storeId}` : sql``}`)
	const [head] = rows
	if (!head) return null
	const { creditedCents, ...facts } = head
	const lines = await readLinesLeft(tx, { producerId, invoiceId: head.id })
	return { ...facts, number, leftCents: facts.totalCents - creditedCents, lines }
}

async function readLinesLeft(tx: Tx, query: { producerId: string; invoiceId: string }): Promise<InvoiceLineLeft[]> {
	const { rows } = await tx.execute<InvoiceLineLeft>(sql`
		select l.id, l.order_line_id as "orderLineId", l.code, l.name, l.detail, l.line_cents as "invoicedCents",
			n.sent as "sentPieces", greatest(0, n.sent - c.pieces) as pieces, l.line_cents - c.line_cents as "lineCents",
			l.tax_cents - c.tax_cents as "taxCents", w.pieces as "waitingPieces",
			coalesce(o.delivery_on, i.issued_on)::text as "deliveredOn"
		from invoice_lines l
		join invoices i on i.producer_id = l.producer_id and i.id = l.invoice_id
		left join orders o on o.producer_id = l.producer_id and o.id = l.order_id
		left join order_lines ol on ol.producer_id = l.producer_id and ol.id = l.order_line_id
		left join products p on p.producer_id = l.producer_id and p.id = l.product_id
		cross join lateral (select l.sent_cases * coalesce(ol.pieces_per_case, p.pieces_per_case, 0)::int as sent) n
		cross join lateral (
			select coalesce(sum(x.pieces), 0)::int as pieces, coalesce(sum(x.line_cents), 0)::int as line_cents,
				coalesce(sum(x.tax_cents), 0)::int as tax_cents
			from credit_lines x where x.producer_id = l.producer_id and x.invoice_line_id = l.id) c
		cross join lateral (
			select coalesce(sum(b.pieces) filter (where r.state = 'open'), 0)::int as pieces
			from breakage_lines b
			join breakage_reports r on r.producer_id = b.producer_id and r.id = b.report_id
			where b.producer_id = l.producer_id and b.invoice_line_id = l.id) w
		where l.producer_id = ${query.producerId} and l.invoice_id = ${query.invoiceId}
		order by l.position`)
	return rows
}
