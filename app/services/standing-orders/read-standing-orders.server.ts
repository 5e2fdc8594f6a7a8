import { type SQL, sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** One product of a standing order; less than `leastCases` is not worth a delivery to the store. */
export type StandingLine = { productId: string; cases: number; leastCases: number }

/** A standing order as it stands in the database. `skips` are dates by its rule. */
export type StandingOrder = {
	id: string
	storeId: string
	rule: string
	startsOn: Day
	endsOn: Day | null
	pausedFrom: Day | null
	createdAt: Date
	endedAt: Date | null
	createdBy: { id: string; email: string }
	lines: StandingLine[]
	skips: Day[]
}

type Row = {
	id: string
	store_id: string
	rule: string
	starts_on: Day
	ends_on: Day | null
	paused_from: Day | null
	created_at: string
	ended_at: string | null
	created_by: string
	email: string
	lines: StandingLine[]
	skips: Day[]
}

/** The standing orders of a producer that meet `condition` (on `so`), with lines and skips, the newest first. One statement. */
export async function readStandingOrders(tx: Tx, producerId: string, condition: SQL): Promise<StandingOrder[]> {
	const { rows } = await tx.execute<Row>(sql`
		select so.id, so.store_id, so.rule, so.starts_on::text, so.ends_on::text, so.paused_from::text,
			so.created_at, so.ended_at, so.created_by, u.email,
			coalesce((
				select json_agg(json_build_object('productId', l.product_id, 'cases', l.cases, 'leastCases', l.least_cases)
					order by l.product_id)
				from standing_order_lines l where l.producer_id = so.producer_id and l.standing_order_id = so.id
			), '[]') as lines,
			array(
				select k.skip_on::text from standing_order_skips k
				where k.producer_id = so.producer_id and k.standing_order_id = so.id order by k.skip_on
			) as skips
		from standing_orders so
		join users u on u.id = so.created_by
		where so.producer_id = ${producerId} and ${condition}
		order by so.created_at desc, so.id`)
	return rows.map((row) => ({
		id: row.id,
		storeId: row.store_id,
		rule: row.rule,
		startsOn: row.starts_on,
		endsOn: row.ends_on,
		pausedFrom: row.paused_from,
		createdAt: new Date(row.created_at),
		endedAt: row.ended_at === null ? null : new Date(row.ended_at),
		createdBy: { id: row.created_by, email: row.email },
		lines: row.lines,
		skips: row.skips,
	}))
}

/** The store's standing order, or null: setting a new one ends the one before. */
export async function readStoreStandingOrder(
	tx: Tx,
	query: { producerId: string; storeId: string },
): Promise<StandingOrder | null> {
	const isRunning = sql`so.store_id = ${query.storeId} and so.ended_at is null`
	const [standing] = await readStandingOrders(tx, query.producerId, isRunning)
	return standing ?? null
}
