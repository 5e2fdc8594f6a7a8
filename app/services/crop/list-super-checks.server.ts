import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import { type Day, isDay } from "~/domain/calendar"

/** A check in a super's history. */
export type ListedCheck = {
	id: string
	checkedOn: Day
	filledPercent: number
	cappedPercent: number
	sections: string
	note: string
	photoId: string | null
	/** Null for one that nobody is named for. */
	who: string | null
}

const PAGE = 20
const KEY = /^([\d-]{10})_(\d{1,17})_([0-9a-f-]{36})$/

/**
 * The checks of a super, the latest day first and of one day the last that reached us first, 20 at a time. `after` is the
 * `next` of an earlier page; one that is malformed gives the first page. `next` is null on the last page.
 */
export function listSuperChecks(query: {
	producerId: string
	superId: string
	after: string | null
}): Promise<{ checks: ListedCheck[]; next: string | null }> {
	const { producerId, superId } = query
	const [, on = "", micros = "", id = ""] = KEY.exec(query.after ?? "") ?? []
	const beyond = isDay(on)
		? sql`and (k.checked_on, k.received_at, k.id) < (${on}::date,
			timestamptz 'epoch' + ${micros}::bigint * interval '1 microsecond', ${id}::uuid)`
		: sql``
	return readProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<ListedCheck & { key: string }>(sql`
			select k.id, k.checked_on::text as "checkedOn", k.filled_percent as "filledPercent",
				k.capped_percent as "cappedPercent", k.sections, k.note, k.photo_id as "photoId", u.name as who,
				concat_ws('_', k.checked_on, (extract(epoch from k.received_at) * 1000000)::bigint, k.id) as key
			from super_checks k
			left join users u on u.id = k.checked_by
			where k.producer_id = ${producerId} and k.super_id = ${superId} ${beyond}
			order by k.checked_on desc, k.received_at desc, k.id desc
			limit ${PAGE + 1}`)
		const page = rows.slice(0, PAGE)
		const next = rows.length > PAGE ? (page.at(-1)?.key ?? null) : null
		return { checks: page.map(({ key, ...check }) => check), next }
	})
}
