import { sql } from "drizzle-orm"

/**
 * What a line `l` of `order_lines` comes to in cents, inside a statement: what was weighed at the price of the pound, rounded
 * once as `weighedPriceCents` does, else the cases that are sure at the price of a case. Numeric keeps far more figures
 * than it takes to tell which side of half a cent a product of whole grams and whole cents lies on.
 */
export const lineCentsSql = sql`case
	when coalesce(l.given_cases, 1) > 0 and l.weighed_grams is not null
		then round(l.weighed_grams::numeric * l.pound_cents / 453.59237)
	else coalesce(l.given_cases, case when l.is_to_share then l.promised_cases else l.asked_cases end) * l.case_cents
end`
