import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type Day, isDay } from "~/domain/calendar"
import { creditNumber } from "~/domain/credits/credit-number"
import type { CreditKind } from "~/domain/credits/credit-words"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"

export type ListedCredit = {
	number: string
	storeName: string
	issuedOn: Day
	kind: CreditKind
	/** The invoice that it mends. */
	invoiceNumber: string | null
	totalCents: number
	/** What has settled nothing yet. */
	onAccountCents: number
}

type Row = Omit<ListedCredit, "number" | "invoiceNumber"> & {
	id: string
	year: number
	sequence: number
	invoiceYear: number | null
	invoiceSequence: number | null
}

const PAGE = 30
const KEY = /^([\d-]{10})_([0-9a-f-]{36})$/

/**
 * Credits of the producer, or of one store where `storeId` is given, the latest first, 30 at a time. `after` is the `next`
 * of an earlier page; one that is malformed gives the first page.
 */
export function listCredits(query: {
	producerId: string
	storeId: string | null
	after: string | null
}): Promise<{ credits: ListedCredit[]; next: string | null }> {
	const { producerId, storeId } = query
	const [, on = "", id = ""] = KEY.exec(query.after ?? "") ?? []
	const beyond = isDay(on) ? sql`and (c.issued_on, c.id) < (${on}::date, ${id}::uuid)` : sql``
	const ofStore = storeId ? sql`and c.store_id = ${storeId}` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			select c.id, c.year, c.sequence, s.name as "storeName", c.issued_on::text as "issuedOn", c.kind,
				i.year as "invoiceYear", i.sequence as "invoiceSequence", c.total_cents as "totalCents",
				c.total_cents - c.settled_cents as "onAccountCents"
			from credits c
			join stores s on s.producer_id = c.producer_id and s.id = c.store_id
			left join invoices i on i.producer_id = c.producer_id and i.id = c.invoice_id
			where c.producer_id = ${producerId} ${ofStore} ${beyond}
			order by c.issued_on desc, c.id desc
			limit ${PAGE + 1}`)
		const page = rows.slice(0, PAGE)
		const last = page.at(-1)
		const credits = page.map(({ id: _, year, sequence, invoiceYear, invoiceSequence, ...row }) => ({
			...row,
			number: creditNumber(year, sequence),
			invoiceNumber:
				invoiceYear !== null && invoiceSequence !== null ? invoiceNumber(invoiceYear, invoiceSequence) : null,
		}))
		return { credits, next: rows.length > PAGE && last ? `${last.issuedOn}_${last.id}` : null }
	})
}
