import { sql } from "drizzle-orm"
import { auditEntries } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import { addDays, type Day } from "~/domain/calendar"

type Ending = { producerId: string; personId: string; now: Date; today: Day; id: string }
type Ended = { ok: true } | { ok: false; reason: "not-known" }

/**
 * Ends a store's own price: from today on the store pays the price of its tier again. One that was to begin today or
 * later is taken off as if it had never been set; placed orders keep their prices. Recorded. Ending it twice is refused.
 */
export function endStorePrice(query: Ending): Promise<Ended> {
	return end(query, {
		table: "store_prices",
		first: "valid_from",
		last: "valid_until",
		action: "end-store-price",
	})
}

/** Ends a promotion: from today on nothing comes off any more, as with a store's own price. Recorded. */
export function endPromotion(query: Ending): Promise<Ended> {
	return end(query, { table: "promotions", first: "starts_on", last: "ends_on", action: "end-promotion" })
}

type Special = { table: "store_prices" | "promotions"; first: string; last: string; action: string }

function end(query: Ending, { table, first, last, action }: Special): Promise<Ended> {
	const { producerId, personId, now, today, id } = query
	return withProducer(producerId, async (tx) => {
		const [name, from, until] = [sql.identifier(table), sql.identifier(first), sql.identifier(last)]
		const row = sql`producer_id = ${producerId} and id = ${id} and (${until} is null or ${until} >= ${today})`
		const { rows } = await tx.execute<{ row: Record<string, unknown>; hasBegun: boolean }>(sql`
			select to_jsonb(special) as row, ${from} < ${today} as "hasBegun" from ${name} special where ${row} for update`)
		const [found] = rows
		if (!found) return { ok: false, reason: "not-known" }
		if (found.hasBegun) await tx.execute(sql`update ${name} set ${until} = ${addDays(today, -1)} where ${row}`)
		else await tx.execute(sql`delete from ${name} where ${row}`)
		await record(tx, { producerId, personId, now, action, detail: { id, ...found.row } })
		return { ok: true }
	})
}

async function record(
	tx: Tx,
	entry: { producerId: string; personId: string; now: Date; action: string; detail: Record<string, unknown> },
): Promise<void> {
	const { producerId, personId, now, action, detail } = entry
	const subject = { subjectType: "product", subjectId: String(detail.product_id) }
	await tx.insert(auditEntries).values({ producerId, at: now, userId: personId, action, ...subject, detail })
}
