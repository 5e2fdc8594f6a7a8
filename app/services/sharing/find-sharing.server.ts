import { sql } from "drizzle-orm"
import { readProducer, type Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { SharingRule } from "~/domain/sharing/share-out"
import { readSharing, type SharingFacts } from "./read-sharing.server"
import { sharedKey } from "./tell-stores.server"

/** A product of a day as it was shared out. */
export type SharingRun = {
	id: string
	rule: SharingRule
	supplyCases: number
	note: string
	sharedAt: Date
	sharedBy: string
	/** No letter has gone and no order has moved on, so it can still be taken back. */
	canUndo: boolean
	shares: {
		lineId: string
		orderNumber: number
		storeName: string
		askedCases: number
		ruleCases: number
		givenCases: number
		sentence: string
	}[]
}

/**
 * What is to be shared out of a product for a day, and how it was shared out last, if it was. Null when the producer has
 * no product of that code.
 */
export function findSharing(query: {
	producerId: string
	productCode: string
	deliveryOn: Day
	today: Day
}): Promise<{ facts: SharingFacts; run: SharingRun | null } | null> {
	return readProducer(query.producerId, async (tx) => {
		const facts = await readSharing(tx, query)
		if (!facts) return null
		return { facts, run: await findRun(tx, { ...query, productId: facts.product.id }) }
	})
}

async function findRun(
	tx: Tx,
	query: { producerId: string; productId: string; deliveryOn: Day },
): Promise<SharingRun | null> {
	const { producerId } = query
	const { rows } = await tx.execute<Omit<SharingRun, "canUndo" | "shares" | "sharedAt"> & { sharedAt: string }>(sql`
		select r.id, r.rule, r.supply_cases as "supplyCases", r.note, r.shared_at as "sharedAt", u.name as "sharedBy"
		from sharing_runs r join users u on u.id = r.shared_by
		where r.producer_id = ${producerId} and r.product_id = ${query.productId} and r.delivery_on = ${query.deliveryOn}
			and r.state = 'told'
		order by r.shared_at desc, r.id limit 1`)
	const [run] = rows
	if (!run) return null
	type Row = SharingRun["shares"][number] & { storeId: string; state: string }
	const { rows: found } = await tx.execute<Row>(sql`
		select s.order_line_id as "lineId", o.number as "orderNumber", st.name as "storeName", s.store_id as "storeId", o.state,
			s.asked_cases as "askedCases", s.rule_cases as "ruleCases", s.given_cases as "givenCases", s.sentence
		from sharing_shares s
		join order_lines l on l.producer_id = s.producer_id and l.id = s.order_line_id
		join orders o on o.producer_id = l.producer_id and o.id = l.order_id
		join stores st on st.producer_id = s.producer_id and st.id = s.store_id
		where s.producer_id = ${producerId} and s.run_id = ${run.id}
		order by s.asked_cases desc, o.number`)
	const keys = found.map(({ storeId }) => sharedKey(run.id, storeId))
	const { rows: gone } = await tx.execute(sql`
		select from outbox_mails
		where producer_id = ${producerId} and sent_at is not null and once_key = any(${sql.param(keys)}::text[]) limit 1`)
	const canUndo = gone.length === 0 && found.every(({ state }) => state === "placed")
	const shares = found.map(({ storeId: _, state: __, ...share }) => share)
	return { ...run, sharedAt: new Date(run.sharedAt), canUndo, shares }
}
