import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { parseInvoiceNumber } from "~/domain/invoicing/invoice-number"
import { type UblInvoice, type UblLine, ublInvoice } from "~/domain/invoicing/ubl-invoice"
import { findYard } from "~/services/producers/find-yard.server"

type Row = Omit<UblInvoice, "number" | "notes" | "supplier" | "customer" | "orders" | "discount" | "lines"> & {
	id: string
	storeName: string
	storeAddress: string
	shortNote: string
	discountUntil: Day | null
	discountBasisPoints: number
	orders: UblInvoice["orders"] | null
}
type LineRow = Omit<UblLine, "lots"> & { lotCodes: string }

/**
 * An invoice as it was issued, as a UBL 2.1 file. With `storeId` it must be that store's. Null when there is none.
 */
export function writeInvoiceUbl(query: {
	producerId: string
	storeId?: string
	number: string
}): Promise<string | null> {
	const { producerId, storeId = null, number } = query
	const named = parseInvoiceNumber(number)
	if (!named) return Promise.resolve(null)
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Row>(sql`
			select i.id, i.issued_on::text as "issuedOn", i.due_on::text as "dueOn", i.terms_words as "termsWords",
				i.discount_until::text as "discountUntil", i.discount_basis_points as "discountBasisPoints",
				i.lines_cents as "linesCents", i.delivery_cents as "deliveryCents", i.tax_cents as "taxCents",
				i.total_cents as "totalCents", i.tax_basis_points as "taxBasisPoints", i.tax_place as "taxPlace",
				i.is_for_resale as "isForResale", i.short_note as "shortNote", s.name as "storeName", s.address as "storeAddress",
				(select json_agg(json_build_object('number', o.number, 'poNumber', o.po_number,
					'deliveredOn', o.delivery_on::text) order by o.delivery_on, o.number)
				from invoice_orders x join orders o on o.producer_id = x.producer_id and o.id = x.order_id
				where x.producer_id = i.producer_id and x.invoice_id = i.id) as orders
			from invoices i join stores s on s.producer_id = i.producer_id and s.id = i.store_id
			where i.producer_id = ${producerId} and i.year = ${named.year} and i.sequence = ${named.sequence}
				and (${storeId}::uuid is null or i.store_id = ${storeId}::uuid)`)
		const row = rows[0]
		if (!row) return null
		const lines = await tx.execute<LineRow>(sql`
			select l.code, l.name, l.detail, l.lot_codes as "lotCodes", o.number as "orderNumber", l.sent_cases as cases,
				l.case_cents as "caseCents", l.pound_cents as "poundCents", l.net_grams as "netGrams",
				l.line_cents as "lineCents", l.tax_cents as "taxCents"
			from invoice_lines l left join orders o on o.producer_id = l.producer_id and o.id = l.order_id
			where l.producer_id = ${producerId} and l.invoice_id = ${row.id}
			order by l.position`)
		const yard = await findYard(tx, producerId)
		return ublInvoice({
			...row,
			number,
			notes: row.shortNote.split("\n").filter((note) => note !== ""),
			supplier: yard,
			customer: {
				name: row.storeName,
				address: row.storeAddress || null,
				contactName: null,
				email: null,
				phone: null,
			},
			orders: row.orders ?? [],
			discount:
				row.discountUntil === null ? null : { basisPoints: row.discountBasisPoints, untilOn: row.discountUntil },
			lines: lines.rows.map(({ lotCodes, ...line }) => ({
				...line,
				lots: lotCodes === "" ? [] : lotCodes.split(", "),
			})),
		})
	})
}
