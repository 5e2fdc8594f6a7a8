import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { type CreditFacts, type CreditWarning, creditWarning } from "~/domain/receivables/credit-standing"
import { onAccountByStore } from "./aged-sums.server"

/** A store's credit now; what is owed is net of what is on its account, and only counted where there is a limit. */
async function readCredit(tx: Tx, query: { producerId: string; storeId: string }): Promise<CreditFacts | null> {
	const { producerId, storeId } = query
	const { rows } = await tx.execute<CreditFacts>(sql`
		select s.is_stopped as "isStopped", s.credit_limit_cents as "creditLimitCents",
			case when s.credit_limit_cents is null then 0 else
				coalesce((
					select sum(i.open_cents) from invoices i
					where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.open_cents > 0
				), 0)::float8 - coalesce((select cents from (${onAccountByStore(producerId, storeId)}) as a), 0)
			end as "owedCents"
		from stores s where s.producer_id = ${producerId} and s.id = ${storeId}`)
	return rows[0] ?? null
}

/** Whether the next order of this store is to be looked at first; null when nothing speaks against it. */
export async function readStoreCredit(
	tx: Tx,
	query: { producerId: string; storeId: string },
): Promise<CreditWarning | null> {
	const facts = await readCredit(tx, query)
	return facts && creditWarning(facts, 0)
}

/**
 * Whether an order that is not invoiced yet is to be looked at first: its store is stopped, or what it owes with this order,
 * as given or else as asked, is above its limit. Null for any other order.
 */
export function findOrderCredit(query: {
	producerId: string
	number: number
}): Promise<{ warning: CreditWarning; storeSlug: string } | null> {
	const { producerId, number } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ storeId: string; storeSlug: string; orderCents: number }>(sql`
			select o.store_id as "storeId", s.slug as "storeSlug",
				coalesce((
					select sum(coalesce(l.given_cases, l.asked_cases) * l.case_cents) from order_lines l
					where l.producer_id = o.producer_id and l.order_id = o.id
				), 0)::float8 + o.delivery_cents as "orderCents"
			from orders o join stores s on s.producer_id = o.producer_id and s.id = o.store_id
			where o.producer_id = ${producerId} and o.number = ${number} and o.state in ('placed', 'confirmed', 'packed')`)
		const [order] = rows
		const facts = order && (await readCredit(tx, { producerId, storeId: order.storeId }))
		const warning = facts ? creditWarning(facts, order.orderCents) : null
		return order && warning ? { warning, storeSlug: order.storeSlug } : null
	})
}
