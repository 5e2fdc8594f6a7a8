import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"

/** A super on a hive, as it is looked into. */
export type RoundSuper = {
	id: string
	productName: string
	productDetail: string
	capacityPieces: number
	setOn: Day
	/** Its place in the stack; 1 is next to the brood. */
	level: number
	state: "on" | "clearing"
	clearingOn: Day | null
	lastCheck: { checkedOn: Day; filledPercent: number; cappedPercent: number; sections: string; note: string } | null
}

export type RoundHive = { id: string; label: string; supers: RoundSuper[] }

export type YardRound = {
	yard: { id: string; name: string; flora: string }
	hives: RoundHive[]
	/** The hive that the next page begins after, or null on the last page. */
	next: string | null
}

const PAGE = 40

/**
 * The round of one yard: its hives in the order of their labels ("2" before "10"), 40 at a time, each with the supers on
 * it from the top down and the latest check of each. A hive without supers is there with none. `after` is the `next` of an
 * earlier page. Null when there is no such yard.
 */
export function findYardRound(query: {
	producerId: string
	yardId: string
	after: string | null
}): Promise<YardRound | null> {
	const { producerId, yardId } = query
	return readProducer(producerId, async (tx) => {
		const { rows: yards } = await tx.execute<YardRound["yard"]>(
			sql`select id, name, flora from yards where producer_id = ${producerId} and id = ${yardId}`,
		)
		if (!yards[0]) return null
		const after = query.after
		const beyond = after
			? sql`and (${orderOf(sql`h.label`)}, h.label) > (${orderOf(sql`${after}::text`)}, ${after})`
			: sql``
		const { rows } = await tx.execute<RoundHive>(sql`
			with page as (
				select h.producer_id, h.id, h.label from hives h
				where h.producer_id = ${producerId} and h.yard_id = ${yardId} and h.is_active ${beyond}
				order by ${orderOf(sql`h.label`)}, h.label
				limit ${PAGE + 1}
			)
			select h.id, h.label, coalesce(json_agg(json_build_object('id', s.id, 'productName', p.name,
				'productDetail', p.detail, 'capacityPieces', s.capacity_pieces, 'setOn', s.set_on::text, 'level', s.level,
				'state', s.state, 'clearingOn', s.clearing_on::text, 'lastCheck', c.last)
				order by s.level desc, s.set_on desc, s.id) filter (where s.id is not null), '[]') as supers
			from page h
			left join supers s on s.producer_id = h.producer_id and s.hive_id = h.id and s.state <> 'off'
			left join products p on p.producer_id = s.producer_id and p.id = s.product_id
			left join lateral (
				select json_build_object('checkedOn', k.checked_on::text, 'filledPercent', k.filled_percent,
					'cappedPercent', k.capped_percent, 'sections', k.sections, 'note', k.note) as last
				from super_checks k
				where k.producer_id = s.producer_id and k.super_id = s.id
				order by k.checked_on desc, k.received_at desc, k.id desc
				limit 1
			) c on true
			group by h.id, h.label
			order by ${orderOf(sql`h.label`)}, h.label`)
		const hives = rows.slice(0, PAGE)
		return { yard: yards[0], hives, next: rows.length > PAGE ? (hives.at(-1)?.label ?? null) : null }
	})
}

/** The number that a label begins with, so that hive 2 stands before hive 10; labels without one stand last. */
function orderOf(label: ReturnType<typeof sql>) {
	return sql`coalesce(substring(${label} from '^[0-9]{1,9}')::int, 2147483647)`
}
