import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"

/** What a line got when its product was shared out. */
export type SharedLine = {
	given: number
	/** The sentence that the store reads. */
	sentence: string
	/** The sentence without the figures that open it: how it was shared. */
	how: string
}

/** The lines of these orders that have been shared out, by line id; of several runs the latest that stands. One statement. */
export async function findSharedSentences(
	tx: Tx,
	query: { producerId: string; orderIds: readonly string[] },
): Promise<Map<string, SharedLine>> {
	const { rows } = await tx.execute<{ lineId: string; given: number; sentence: string }>(sql`
		select distinct on (s.order_line_id) s.order_line_id as "lineId", s.given_cases as given, s.sentence
		from sharing_shares s
		join sharing_runs r on r.producer_id = s.producer_id and r.id = s.run_id
		join order_lines l on l.producer_id = s.producer_id and l.id = s.order_line_id
		where s.producer_id = ${query.producerId} and r.state = 'told'
			and l.order_id = any(${sql.param([...query.orderIds])}::uuid[])
		order by s.order_line_id, r.shared_at desc, r.id`)
	return new Map(
		rows.map(({ lineId, given, sentence }) => [
			lineId,
			{ given, sentence, how: sentence.slice(sentence.indexOf(". ") + 1).trim() },
		]),
	)
}
