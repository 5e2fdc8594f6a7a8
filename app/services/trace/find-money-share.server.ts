import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { isRetailFoodEstablishment } from "~/domain/trace/record-fields"

/** A year's sales in cents, to consumers and to all others, without tax and delivery. */
export type MoneyShare = { year: number; consumerCents: number; otherCents: number; isRetail: boolean }

/** How a year's money divides between the public and the stores, and what that means for registration. */
export function findMoneyShare(query: {
	producer: { id: string; timeZone: string }
	year: number
}): Promise<MoneyShare> {
	const { producer, year } = query
	const [from, to] = [`${year}-01-01`, `${year + 1}-01-01`]
	return readProducer(producer.id, async (tx) => {
		const { rows } = await tx.execute<{ consumerCents: number; otherCents: number }>(sql`
			select
				(select coalesce(sum(s.total_cents), 0)::int from sales s
					join market_days d on d.producer_id = s.producer_id and d.id = s.market_day_id
					where s.producer_id = ${producer.id} and s.state = 'paid' and d.market_on >= ${from} and d.market_on < ${to}
				) as "consumerCents",
				(select coalesce(sum(i.lines_cents), 0)::int from invoices i
					where i.producer_id = ${producer.id} and i.kind = 'goods' and i.issued_on >= ${from} and i.issued_on < ${to}) as "otherCents"`)
		const share = rows[0] ?? { consumerCents: 0, otherCents: 0 }
		return { year, ...share, isRetail: isRetailFoodEstablishment(share) }
	})
}
