import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { SharingRule } from "~/domain/sharing/share-out"

/** How a product of an order was shared out, as its store may know it: its own figures and the rule. */
export type OrderShare = {
	productCode: string
	productName: string
	askedCases: number
	givenCases: number
	rule: SharingRule
	sentence: string
}

/** What a store got of each shared product of its order, by product code; of several runs the latest that stands. */
export function findOrderShares(query: { producerId: string; storeId: string; number: number }): Promise<OrderShare[]> {
	const { producerId, storeId, number } = query
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<OrderShare>(sql`
			select distinct on (length(p.code), p.code) p.code as "productCode", p.name as "productName",
				s.asked_cases as "askedCases", s.given_cases as "givenCases", r.rule, s.sentence
			from orders o
			join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
			join sharing_shares s on s.producer_id = l.producer_id and s.order_line_id = l.id and s.store_id = o.store_id
			join sharing_runs r on r.producer_id = s.producer_id and r.id = s.run_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where o.producer_id = ${producerId} and o.store_id = ${storeId} and o.number = ${number} and r.state = 'told'
			order by length(p.code), p.code, r.shared_at desc, r.id`)
		return rows
	})
}
