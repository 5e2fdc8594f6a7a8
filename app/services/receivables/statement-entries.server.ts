import { type SQL, sql } from "drizzle-orm"
import type { Day } from "~/domain/calendar"

/**
 * All that has moved a store's balance up to a day, one row for each paper: `on`, `rank` (the order within a day), `num`
 * (the number it has), `id`, `kind`, `cents` as on its paper, and what its words are made of. A payment counts when it has
 * settled; what of it went back is a row of its own.
 */
export function statementEntries(query: { producerId: string; storeId: string; until: Day }): SQL {
	const { producerId, storeId, until } = query
	return sql`
		select i.issued_on as on, 1 as rank, i.year::bigint * 10000000 + i.sequence as num, i.id, 'invoice' as kind,
			i.total_cents as cents, i.year::int, i.sequence, i.kind as what, i.due_on, i.po_numbers as words
		from invoices i
		where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.issued_on <= ${until}
		union all
		select c.issued_on, 2, c.year::bigint * 10000000 + c.sequence, c.id, 'credit', c.total_cents, c.year::int, c.sequence, c.kind,
			null, c.reason
		from credits c
		where c.producer_id = ${producerId} and c.store_id = ${storeId} and c.issued_on <= ${until}
		union all
		select p.received_on, 3, 0::bigint, p.id, 'payment', p.amount_cents, null, null, p.method, null, p.reference
		from payments p
		where p.producer_id = ${producerId} and p.store_id = ${storeId} and p.state = 'settled' and p.received_on <= ${until}
		union all
		select r.returned_on, 4, 0::bigint, r.id, 'return', r.amount_cents, null, null, r.kind, null, r.note
		from payments p
		join payment_returns r on r.producer_id = p.producer_id and r.payment_id = p.id and r.state = 'done'
		where p.producer_id = ${producerId} and p.store_id = ${storeId} and p.state = 'settled' and r.returned_on <= ${until}
		union all
		select t.settled_on, case t.kind when 'discount' then 5 else 6 end, i.year::bigint * 10000000 + i.sequence, t.id, t.kind,
			t.amount_cents, i.year::int, i.sequence, null, null, ''
		from invoices i
		join settlements t on t.producer_id = i.producer_id and t.invoice_id = i.id and t.kind in ('discount', 'write-off')
		where i.producer_id = ${producerId} and i.store_id = ${storeId} and t.settled_on <= ${until}`
}
