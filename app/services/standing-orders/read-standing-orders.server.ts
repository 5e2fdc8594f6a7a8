import { type SQL, sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { DateChange } from "~/domain/standing-orders/lines-on-date"

/**
 * One product of a standing order; less than `leastCases` is not worth a delivery to the store. `substituteIds` may stand
 * in for it when it is short, the most welcome first.
 */
export type StandingLine = { productId: string; cases: number; leastCases: number; substituteIds: string[] }

/** A standing order as it stands in the database. `skips` are dates by its rule. */
export type StandingOrder = {
	id: string
	storeId: string
	rule: string
	startsOn: Day
	endsOn: Day | null
	pausedFrom: Day | null
	/** The last day of the pause; null is until it is resumed. */
	pausedUntil: Day | null
	/** Made before the season: served first when the crop is short. */
	isCommitment: boolean
	createdAt: Date
	endedAt: Date | null
	createdBy: { id: string; email: string }
	lines: StandingLine[]
	skips: Day[]
	/** Cases for one date only, by date of the rule. */
	changes: DateChange[]
}

type Row = {
	id: string
	store_id: string
	rule: string
	starts_on: Day
	ends_on: Day | null
	paused_from: Day | null
	paused_until: Day | null
	is_commitment: boolean
	created_at: string
	ended_at: string | null
	created_by: string
	email: string
	lines: StandingLine[]
	skips: Day[]
	changes: DateChange[]
}

/** The standing orders of a producer that meet `condition` (on `so`), with lines, skips and changes, the newest first. One statement. */
export async function readStandingOrders(tx: Tx, producerId: string, condition: SQL): Promise<StandingOrder[]> {
	const { rows } = await tx.execute<Row>(sql`
		select so.id, so.store_id, so.rule, so.starts_on::text, so.ends_on::text, so.paused_from::text,
			so.paused_until::text, so.is_commitment,
			so.created_at, so.ended_at, so.created_by, u.email,
			coalesce((
				select json_agg(json_build_object('productId', l.product_id, 'cases', l.cases, 'leastCases', l.least_cases,
					'substituteIds', l.substitute_ids)
					order by l.product_id)
				from standing_order_lines l where l.producer_id = so.producer_id and l.standing_order_id = so.id
			), '[]') as lines,
			array(
				select k.skip_on::text from standing_order_skips k
				where k.producer_id = so.producer_id and k.standing_order_id = so.id order by k.skip_on
			) as skips,
			coalesce((
				select json_agg(json_build_object('on', c.change_on, 'productId', c.product_id, 'cases', c.cases)
					order by c.change_on, c.product_id)
				from standing_order_changes c where c.producer_id = so.producer_id and c.standing_order_id = so.id
			), '[]') as changes
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
		pausedUntil: row.paused_until,
		isCommitment: row.is_commitment,
		createdAt: new Date(row.created_at),
		endedAt: row.ended_at === null ? null : new Date(row.ended_at),
		createdBy: { id: row.created_by, email: row.email },
		lines: row.lines,
		skips: row.skips,
		changes: row.changes,
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
