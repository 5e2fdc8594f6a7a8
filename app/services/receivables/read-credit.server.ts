import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import { type CreditFacts, type CreditWarning, creditWarning } from "~/domain/receivables/credit-standing"
import { onAccountByStore } from "./aged-sums.server"

/** What a store's credit looks like now; what is owed is net of what is on its account. Null without such a store. */
export async function readCredit(tx: Tx, query: { producerId: string; storeId: string }): Promise<CreditFacts | null> {
	const { producerId, storeId } = query
	const { rows } = await tx.execute<CreditFacts>(sql`
		select s.is_stopped as "isStopped", s.credit_limit_cents as "creditLimitCents",
			coalesce((
				select sum(i.open_cents) from invoices i
				where i.producer_id = ${producerId} and i.store_id = ${storeId} and i.open_cents > 0
			), 0)::float8 - coalesce((select cents from (${onAccountByStore(producerId, storeId)}) as a), 0) as "owedCents"
		from stores s where s.producer_id = ${producerId} and s.id = ${storeId}`)
	return rows[0] ?? null
}

/** Whether an order of so many cents of this store is to be looked at first; null when nothing speaks against it. */
export function findCreditWarning(query: {
	producerId: string
	storeId: string
	orderCents: number
}): Promise<CreditWarning | null> {
	return readProducer(query.producerId, async (tx) => {
		const facts = await readCredit(tx, query)
		return facts && creditWarning(facts, query.orderCents)
	})
}
