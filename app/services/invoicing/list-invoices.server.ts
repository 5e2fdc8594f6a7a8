import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber, parseInvoiceNumber } from "~/domain/invoicing/invoice-number"

/** Which invoices a list shows: with something owed, owed past the due day, all paid, or any. */
export type InvoiceFilter = "open" | "late" | "paid" | "all"

export type ListedInvoice = {
	number: string
	storeName: string
	/** One number, or several: "318, 325"; empty on a charge. */
	orderNumbers: string
	issuedOn: Day
	dueOn: Day
	totalCents: number
	openCents: number
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
			select i.year, i.sequence, s.name as "storeName", o.numbers as "orderNumbers", i.issued_on::text as "issuedOn",
				i.due_on::text as "dueOn", i.total_cents as "totalCents", i.open_cents as "openCents",
				i.open_cents = 0 as "isPaid"
			from invoices i
			join stores s on s.producer_id = i.producer_id and s.id = i.store_id
			left join lateral (
				select coalesce(string_agg(o.number::text, ', ' order by o.number), '') as numbers from invoice_orders x
				join orders o on o.producer_id = x.producer_id and o.id = x.order_id
				where x.producer_id = i.producer_id and x.invoice_id = i.id
			) o on true
			where i.producer_id = ${producerId} ${ofStore} ${filtered(query)} ${beyond(query.after)}
			order by (i.open_cents = 0), i.year desc, i.sequence desc
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
	if (filter === "open") return sql`and i.open_cents > 0`
	if (filter === "late") return sql`and i.open_cents > 0 and i.due_on < ${today}`
	return filter === "paid" ? sql`and i.open_cents = 0` : sql``
}

function beyond(after: string | null) {
	const [standing, number = ""] = after?.split("_") ?? []
	const named = parseInvoiceNumber(number)
	if (!named || (standing !== "paid" && standing !== "open")) return sql``
	const isPaid = standing === "paid"
	return sql`and ((i.open_cents = 0), -i.year::int, -i.sequence) > (${isPaid}::boolean, ${-named.year}::int, ${-named.sequence}::int)`
}
