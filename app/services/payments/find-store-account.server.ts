import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type OpenAccountInvoice, readPayable } from "./read-payable.server"

/** What a store owes invoice by invoice, and what it has on account: payments and credits with something left. */
export type StoreAccount = {
	storeId: string
	name: string
	slug: string
	invoices: OpenAccountInvoice[]
	onAccountCents: number
}

/** The account of the store that the address names; null when there is none. */
export function findStoreAccount(query: { producerId: string; slug: string }): Promise<StoreAccount | null> {
	const { producerId, slug } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<StoreAccount, "invoices">>(sql`
			select s.id as "storeId", s.name, s.slug,
				(coalesce((select sum(p.amount_cents - p.settled_cents - p.returned_cents) from payments p
					where p.producer_id = s.producer_id and p.store_id = s.id and p.state = 'settled'
						and p.settled_cents + p.returned_cents < p.amount_cents), 0)
				+ coalesce((select sum(c.total_cents - c.settled_cents) from credits c
					where c.producer_id = s.producer_id and c.store_id = s.id and c.settled_cents < c.total_cents), 0)
				)::int as "onAccountCents"
			from stores s where s.producer_id = ${producerId} and s.slug = ${slug}`)
		const store = rows[0]
		return store ? { ...store, invoices: await readPayable(tx, { producerId, storeId: store.storeId }) } : null
	})
}
