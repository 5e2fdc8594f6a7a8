import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"

/** How many entries a page of the timeline shows. */
const SHOWN = 40

/** A step of an order, or a message about it; `body` is what a message says. */
export type TimelineEntry = {
	id: string
	kind: string
	/** The side that wrote a message; null for a step. */
	side: "store" | "desk" | null
	who: string | null
	at: Date
	body: string | null
	detail: Record<string, unknown>
}

/** The newest entries of a timeline, the earliest of them first; `earlier` is the key of what comes before. */
export type Timeline = { entries: TimelineEntry[]; earlier: string | null }

const KEY = /^\d{4}-\d\d-\d\d \d\d:\d\d:\d\d(\.\d{1,6})?\+00~[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

/**
 * What has happened to an order and what was written about it, in one list by time. `before` is the key that an earlier
 * page handed out; anything else is as none. `storeId` keeps a store to its own orders. One statement.
 */
export function findTimeline(query: {
	producerId: string
	number: number
	storeId?: string
	before?: string | null
}): Promise<Timeline> {
	const { producerId, number, storeId } = query
	const [at, id] = query.before && KEY.test(query.before) ? query.before.split("~") : []
	const before = at && id ? sql`and (at, id) < (${at}::timestamptz, ${id}::uuid)` : sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<Omit<TimelineEntry, "at"> & { at: string; key: string }>(sql`
			with o as (
				select id from orders where producer_id = ${producerId} and number = ${number}
					${storeId ? sql`and store_id = ${storeId}` : sql``}
			), steps as (
				select id, kind, null::text as side, user_id, at, null::text as body, detail from order_events
				where producer_id = ${producerId} and order_id = (select id from o) ${before}
				order by at desc, id desc limit ${SHOWN + 1}
			), messages as (
				select * from (
					select id, 'message' as kind, side, written_by as user_id, written_at as at, body, '{}'::jsonb as detail
					from order_messages where producer_id = ${producerId} and order_id = (select id from o)
				) m where true ${before}
				order by at desc, id desc limit ${SHOWN + 1}
			)
			select e.id, e.kind, e.side, u.name as who, e.body, e.detail, e.at,
				(e.at at time zone 'UTC')::text || '+00~' || e.id as key
			from (select * from steps union all select * from messages) e
			left join users u on u.id = e.user_id
			order by e.at desc, e.id desc limit ${SHOWN + 1}`)
		const shown = rows.slice(0, SHOWN)
		return {
			entries: shown.map(({ key: _, at: moment, ...entry }) => ({ ...entry, at: new Date(moment) })).toReversed(),
			earlier: rows.length > SHOWN ? (shown.at(-1)?.key ?? null) : null,
		}
	})
}
