import { sql } from "drizzle-orm"
import { auditEntries } from "~/db/schema"
import { readProducer, type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"

/** A rate of the table with whether it is the one in force, one of the past, or one to come. */
export type ListedRate = {
	id: string
	place: string
	validFrom: Day
	basisPoints: number
	standing: "in-force" | "past" | "to-come"
}

export type TaxRateBook = {
	ownBasisPoints: number
	rates: ListedRate[]
	/** How many stores are charged by each place's rate, by place; the empty place is the producer's own rate. */
	stores: { place: string; count: number; exempt: number }[]
}

/** The rates of a producer by place and day, and how many stores each place is charged. */
export function findTaxRates(query: { producerId: string; today: Day }): Promise<TaxRateBook> {
	const { producerId, today } = query
	return readProducer(producerId, async (tx) => {
		const own = await tx.execute<{ basisPoints: number }>(sql`
			select sales_tax_basis_points as "basisPoints" from producer_settings where producer_id = ${producerId}`)
		const rates = await tx.execute<ListedRate>(sql`
			select id, place, valid_from::text as "validFrom", basis_points as "basisPoints",
				case when valid_from > ${today} then 'to-come'
					when valid_from = max(valid_from) filter (where valid_from <= ${today})
						over (partition by lower(trim(place))) then 'in-force'
					else 'past' end as standing
			from tax_rates where producer_id = ${producerId}
			order by lower(trim(place)), valid_from desc`)
		const stores = await tx.execute<TaxRateBook["stores"][number]>(sql`
			select tax_place as place, count(*)::int as count,
				count(*) filter (where resale_certificate_until >= ${today})::int as exempt
			from stores where producer_id = ${producerId} and is_active group by tax_place order by tax_place`)
		return { ownBasisPoints: own.rows[0]?.basisPoints ?? 0, rates: rates.rows, stores: stores.rows }
	})
}

type By = { producerId: string; personId: string }

/**
 * Writes the rate of a place from a day on; one of the same place and day is replaced. What was issued keeps its rate.
 * Refused when it would begin before today: invoices of those days have gone. Recorded.
 */
export function setTaxRate(
	query: By & { place: string; validFrom: Day; basisPoints: number; today: Day },
): Promise<Result<object, { ok: false; reason: "in-the-past" }>> {
	const { producerId, place, validFrom, basisPoints, today } = query
	if (validFrom < today) return Promise.resolve({ ok: false, reason: "in-the-past" })
	return withProducer(producerId, async (tx) => {
		// Written as it is written already: "teasel county" is no second place.
		const { rows } = await tx.execute<{ place: string }>(sql`
			select place from tax_rates where producer_id = ${producerId} and lower(trim(place)) = lower(trim(${place}))
			order by valid_from limit 1`)
		const name = rows[0]?.place ?? place.trim()
		const { rows: written } = await tx.execute<{ id: string }>(sql`
			insert into tax_rates (producer_id, place, valid_from, basis_points)
			values (${producerId}, ${name}, ${validFrom}, ${basisPoints})
			on conflict on constraint tax_rates_once do update set basis_points = excluded.basis_points
			returning id`)
		await record(tx, query, {
			action: "sales-tax rate set",
			id: written[0]?.id ?? producerId,
			detail: { place: name, validFrom, basisPoints },
		})
		return { ok: true }
	})
}

/** Takes back a rate that has not begun; false for one that is in force or past: a new one takes its place. Recorded. */
export function dropTaxRate(query: By & { rateId: string; today: Day }): Promise<boolean> {
	const { producerId, rateId, today } = query
	return withProducer(producerId, async (tx) => {
		const { rows } = await tx.execute<{ place: string; validFrom: Day; basisPoints: number }>(sql`
			delete from tax_rates where producer_id = ${producerId} and id = ${rateId} and valid_from > ${today}
			returning place, valid_from::text as "validFrom", basis_points as "basisPoints"`)
		if (!rows[0]) return false
		await record(tx, query, { action: "sales-tax rate taken back", id: rateId, detail: rows[0] })
		return true
	})
}

/** Sets the rate where no place is named, from now on. Recorded. */
export function setOwnTaxRate(query: By & { basisPoints: number }): Promise<void> {
	const { producerId, basisPoints } = query
	return withProducer(producerId, async (tx) => {
		await tx.execute(sql`
			update producer_settings set sales_tax_basis_points = ${basisPoints} where producer_id = ${producerId}`)
		await record(tx, query, { action: "own sales-tax rate set", id: producerId, detail: { basisPoints } })
	})
}

async function record(tx: Tx, by: By, entry: { action: string; id: string; detail: object }): Promise<void> {
	await tx.insert(auditEntries).values({
		producerId: by.producerId,
		userId: by.personId,
		action: entry.action,
		subjectType: "sales-tax",
		subjectId: entry.id,
		detail: { ...entry.detail },
	})
}
