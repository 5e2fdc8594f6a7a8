import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber, parseInvoiceNumber } from "~/domain/invoicing/invoice-number"

/** Which invoices a list shows: with something owed, owed past the due day, all paid, or any. */
export type InvoiceFilter = "open" | "late" | "paid" | "all"

export type ListedInvoice = {
	number: string
	storeName: string
	orderNumber: number
	issuedOn: Day
	dueOn: Day
	totalCents: number
	paidCents: number
}

type Row = Omit<ListedInvoice, "number"> & { year: number; sequence: number; isPaid: boolean }

const PAGE = 30

/**
 * Invoices of the producer, or of one store where `storeId` is given: those with something owed first, then by number,
 * the latest first; 30 at a time. `after` is the `next` of an earlier page; one that is malformed gives the first page.
 */
export function listInvoices(query: {
	producerId: string
	storeId: string | null
	filter: InvoiceFilter
	today: Day
	after: string | null
}): Promise<{ invoices: ListedInvoice[]; next: string | null }> {
	const { producerId, storeId } = query
	const ofStore = storeId ? sql`and i.store_id = ${storeId}` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			select i.year, i.sequence, s.name as "storeName", o.number as "orderNumber", i.issued_on::text as "issuedOn",
				i.due_on::text as "dueOn", i.total_cents as "totalCents", i.paid_cents as "paidCents",
				i.paid_cents >= i.total_cents as "isPaid"
			from invoices i
			join stores s on s.producer_id = i.producer_id and s.id = i.store_id
			join orders o on o.producer_id = i.producer_id and o.id = i.order_id
			where i.producer_id = ${producerId} ${ofStore} ${filtered(query)} ${beyond(query.after)}
			order by (i.paid_cents >= i.total_cents), i.year desc, i.sequence desc
			limit ${PAGE + 1}`)
		const page = rows.slice(0, PAGE)
		const last = page.at(-1)
		const invoices = page.map(({ year, sequence, isPaid: _, ...row }) => ({
			...row,
			number: invoiceNumber(year, sequence),
		}))
		const next =
			rows.length > PAGE && last ? `${last.isPaid ? "paid" : "open"}_${invoiceNumber(last.year, last.sequence)}` : null
		return { invoices, next }
	})
}

function filtered({ filter, today }: { filter: InvoiceFilter; today: Day }) {
	if (filter === "open") return sql`and i.paid_cents < i.total_cents`
	if (filter === "late") return sql`and i.paid_cents < i.total_cents and i.due_on < ${today}`
	return filter === "paid" ? sql`and i.paid_cents >= i.total_cents` : sql``
}

function beyond(after: string | null) {
	const [standing, number = ""] = after?.split("_") ?? []
	const named = parseInvoiceNumber(number)
	if (!named || (standing !== "paid" && standing !== "open")) return sql``
	const isPaid = standing === "paid"
	return sql`and ((i.paid_cents >= i.total_cents), -i.year::int, -i.sequence) > (${isPaid}::boolean, ${-named.year}::int, ${-named.sequence}::int)`
}
