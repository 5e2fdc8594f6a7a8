import { type SQL, sql } from "drizzle-orm"
import { CHECKS_LOOKED_AT } from "~/domain/crop/super-facts"

/**
 * The last few checks of each super as JSON, the latest first, in the shape of the domain's `SuperCheck`: a lateral part
 * of a statement in which the supers have the alias `supers`. Reads no further down the index than it shows.
 */
export function lastChecksOf(supers: "s"): SQL {
	const alias = sql.raw(supers)
	return sql`(
		select coalesce(json_agg(json_build_object('checkedOn', l.checked_on::text, 'filledPercent', l.filled_percent,
			'cappedPercent', l.capped_percent, 'sections', l.sections)
			order by l.checked_on desc, l.received_at desc, l.id desc), '[]') as checks
		from (
			select k.id, k.checked_on, k.received_at, k.filled_percent, k.capped_percent, k.sections
			from super_checks k
			where k.producer_id = ${alias}.producer_id and k.super_id = ${alias}.id
			order by k.checked_on desc, k.received_at desc, k.id desc
			limit ${CHECKS_LOOKED_AT}
		) as l
	)`
}
