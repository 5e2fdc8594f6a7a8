import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { parseCreditNumber } from "~/domain/credits/credit-number"
import type { CreditKind } from "~/domain/credits/credit-words"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import { findYard, letterHead } from "~/services/producers/find-yard.server"
import type { CreditProps } from "~emails/documents/credit-props"

type Head = {
	id: string
	issuedOn: Day
	kind: CreditKind
	reason: string
	taxCents: number
	totalCents: number
	settledCents: number
	storeName: string
	address: string
	invoiceYear: number | null
	invoiceSequence: number | null
	invoicedOn: Day | null
	settledInvoices: { year: number; sequence: number; cents: number }[]
}

type Line = { code: string; name: string; detail: string; pieces: number; lineCents: number }

/**
 * Reads one credit by its printed number. With `storeId` it must be that store's. Null when there is none. Page, letter
 * and PDF are all drawn from what this answers.
 */
export async function readCredit(
	tx: Tx,
	query: { producerId: string; storeId?: string; number: string },
): Promise<CreditProps | null> {
	const { producerId, storeId, number } = query
	const named = parseCreditNumber(number)
	if (!named) return null
	const { rows: heads } = await tx.execute<Head>(sql`
		select c.id, c.issued_on::text as "issuedOn", c.kind, c.reason, c.tax_cents as "taxCents", c.total_cents as "totalCents",
			c.settled_cents as "settledCents", s.name as "storeName", s.address, i.year as "invoiceYear",
			i.sequence as "invoiceSequence", i.issued_on::text as "invoicedOn",
			(select coalesce(json_agg(json_build_object('year', n.year, 'sequence', n.sequence, 'cents', t.cents)
					order by n.year, n.sequence), '[]'::json)
				from (select x.invoice_id, sum(x.amount_cents)::int as cents from settlements x
					where x.producer_id = c.producer_id and x.credit_id = c.id group by x.invoice_id having sum(x.amount_cents) > 0) t
				join invoices n on n.producer_id = c.producer_id and n.id = t.invoice_id) as "settledInvoices"
		from credits c
		join stores s on s.producer_id = c.producer_id and s.id = c.store_id
		left join invoices i on i.producer_id = c.producer_id and i.id = c.invoice_id
		where c.producer_id = ${producerId} and c.year = ${named.year} and c.sequence = ${named.sequence}
			${storeId ? sql`and c.store_id = ${storeId}` : sql``}`)
	const [head] = heads
	if (!head) return null
	const { rows: lines } = await tx.execute<Line>(sql`
		select code, name, detail, pieces, line_cents as "lineCents" from credit_lines
		where producer_id = ${producerId} and credit_id = ${head.id} order by position`)
	const yard = await findYard(tx, producerId)
	const { invoiceYear, invoiceSequence, invoicedOn } = head
	return {
		yard: letterHead(yard),
		number,
		issuedOn: head.issuedOn,
		kind: head.kind,
		reason: head.reason,
		store: { name: head.storeName, address: head.address || null },
		invoice:
			invoiceYear !== null && invoiceSequence !== null && invoicedOn !== null
				? { number: invoiceNumber(invoiceYear, invoiceSequence), issuedOn: invoicedOn }
				: null,
		lines: lines.map((line) => ({
			sheetNumber: line.code || null,
			productName: line.name,
			productNote: line.detail || null,
			pieces: line.pieces,
			amountCents: line.lineCents,
		})),
		taxCents: head.taxCents,
		totalCents: head.totalCents,
		settled: head.settledInvoices.map(({ year, sequence, cents }) => ({
			invoiceNumber: invoiceNumber(year, sequence),
			cents,
		})),
		onAccountCents: head.totalCents - head.settledCents,
	}
}
