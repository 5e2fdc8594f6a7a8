import { sql } from "drizzle-orm"
import type { Tx } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { rateOn, type TaxRate } from "~/domain/invoicing/tax-rate"

/**
 * The sales-tax rate of a place on a day in basis points; the producer's own rate where no place is named. Null when the
 * place has no rate that has begun.
 */
export async function findTaxRate(
	tx: Tx,
	query: { producerId: string; place: string; on: Day },
): Promise<number | null> {
	const { producerId, place, on } = query
	if (place.trim() === "") {
		const { rows } = await tx.execute<{ basisPoints: number }>(sql`
			select sales_tax_basis_points as "basisPoints" from producer_settings where producer_id = ${producerId}`)
		return rows[0]?.basisPoints ?? 0
	}
	const { rows } = await tx.execute<TaxRate>(sql`
		select place, valid_from::text as "validFrom", basis_points as "basisPoints" from tax_rates
		where producer_id = ${producerId} and lower(trim(place)) = lower(trim(${place}))`)
	return rateOn(rows, place, on)?.basisPoints ?? null
}
