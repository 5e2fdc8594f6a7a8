import { type SQL, sql } from "drizzle-orm"
import { addDays, type Day } from "~/domain/calendar"
import { AGEING_MOST_DAYS, ageingBuckets } from "~/domain/invoicing/ageing"

/** What is open, summed into the ageing columns in their order, as an array; null where a column has nothing. */
export function agedSums(dueOn: SQL, openCents: SQL, today: Day): SQL {
	// Days and not sums of days: what is reckoned here is not reckoned again for every invoice.
	const firstDueOn = Object.values(AGEING_MOST_DAYS).map((days) => addDays(today, -days))
	const columns = ageingBuckets.map((_, index) => {
		const above = index === 0 ? sql`true` : sql`${dueOn} < ${firstDueOn[index - 1]}`
		const within = index === firstDueOn.length ? sql`true` : sql`${dueOn} >= ${firstDueOn[index]}`
		return sql`sum(${openCents}) filter (where ${above} and ${within})::float8`
	})
	return sql`array[${sql.join(columns, sql`, `)}]`
}

/** What is on a store's account and settles nothing yet, by store: rows of `store_id` and `cents`. */
export function onAccountByStore(producerId: string, storeId?: string): SQL {
	const of = (alias: SQL) =>
		storeId === undefined
			? sql`${alias}.producer_id = ${producerId}`
			: sql`${alias}.producer_id = ${producerId} and ${alias}.store_id = ${storeId}`
	return sql`
		select store_id, sum(cents)::float8 as cents from (
			select p.store_id, p.amount_cents - p.settled_cents - p.returned_cents as cents from payments p
			where ${of(sql`p`)} and p.state = 'settled' and p.settled_cents + p.returned_cents < p.amount_cents
			union all
			select c.store_id, c.total_cents - c.settled_cents from credits c
			where ${of(sql`c`)} and c.settled_cents < c.total_cents
		) as over group by store_id`
}
