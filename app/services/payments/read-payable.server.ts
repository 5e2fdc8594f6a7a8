import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { invoiceNumber } from "~/domain/invoicing/invoice-number"
import type { PayableInvoice } from "~/domain/payments/lay-payment"

/** An open invoice as it can be paid. `onItsWayCents` is what debits that have not cleared will settle of it. */
export type OpenAccountInvoice = PayableInvoice & { issuedOn: Day; onItsWayCents: number }

type Row = Omit<OpenAccountInvoice, "number"> & { year: number; sequence: number }

/** The store's open invoices, the one due first before the later; those of `invoiceIds` alone where it is given. */
export async function readPayable(
	tx: Tx,
	query: { producerId: string; storeId: string; invoiceIds?: readonly string[] },
): Promise<OpenAccountInvoice[]> {
	const { producerId, storeId, invoiceIds } = query
	const named = invoiceIds ? sql`and i.id = any(${sql.param([...invoiceIds])}::uuid[])` : sql``
	const { rows } = await tx.execute<Row>(sql`
		select i.id, i.year, i.sequence, i.issued_on::text as "issuedOn", i.due_on::text as "dueOn", i.open_cents as "openCents",
			i.total_cents as "totalCents", i.credited_cents as "creditedCents", i.discount_cents as "takenDiscountCents",
			i.discount_until::text as "discountUntil", i.discount_basis_points as "discountBasisPoints",
			coalesce(w.cents, 0)::int as "onItsWayCents"
		from invoices i
		left join lateral (
			select sum(p.amount_cents + p.discount_cents) as cents from online_payment_parts p
			join online_payments o on o.producer_id = p.producer_id and o.id = p.online_payment_id and o.state = 'on-its-way'
			where p.producer_id = i.producer_id and p.invoice_id = i.id
		) w on true
		where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.open_cents > 0 ${named}
		order by i.due_on, i.year, i.sequence`)
	return rows.map(({ year, sequence, ...row }) => ({ ...row, number: invoiceNumber(year, sequence) }))
}
