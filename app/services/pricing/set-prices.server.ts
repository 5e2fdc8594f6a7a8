import { sql } from "drizzle-orm"
import { auditEntries } from "~/db/schema"
import { type Tx, withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import { comparePrice, mayBeginOn, type NewPrice, storedCents } from "~/domain/pricing/compare-prices"
import type { Result } from "~/domain/result"
import { lockProducts } from "~/services/orders/lock-products.server"
import { readPriceBook } from "./read-price-book.server"

/** A price to set, with what the person saw to hold on its first day; null where they saw none. */
export type SeenPrice = NewPrice & { oldCents: number | null }

type Changed = SeenPrice & { caseCents: number; poundCents: number | null }

/**
 * Sets prices of tiers, all or none, each from its day on. Refused when one begins before today, names a product or tier
 * that is not there, or when what the person saw no longer holds. A price that was to begin on the same day is replaced;
 * earlier days and placed orders stay as they are. Prices that say what holds already are not written. One audit entry for
 * each product. Answers how many were set.
 */
export function setPrices(query: {
	producerId: string
	personId: string
	now: Date
	today: Day
	prices: readonly SeenPrice[]
}): Promise<Result<{ set: number }, { ok: false; reason: "not-known" | "in-the-past" | "prices-changed" }>> {
	const { producerId, personId, now: at, today, prices } = query
	return withProducer(producerId, async (tx) => {
		await lockProducts(tx, { producerId, productIds: [...new Set(prices.map(({ productId }) => productId))] })
		const book = await readPriceBook(tx, producerId)
		const changed: Changed[] = []
		for (const price of prices) {
			const product = book.products.find(({ id }) => id === price.productId)
			if (!product || !book.tiers.some(({ id }) => id === price.tierId)) return { ok: false, reason: "not-known" }
			if (!mayBeginOn(price.validFrom, today)) return { ok: false, reason: "in-the-past" }
			const now = comparePrice(price, book)
			if (now.oldCents !== price.oldCents) return { ok: false, reason: "prices-changed" }
			if (now.kind !== "unchanged") changed.push({ ...price, ...storedCents(product, price.cents) })
		}
		if (changed.length > 0) await write(tx, { producerId, personId, at, changed })
		return { ok: true, set: changed.length }
	})
}

type Write = { producerId: string; personId: string; at: Date; changed: readonly Changed[] }

async function write(tx: Tx, { producerId, personId, at, changed }: Write) {
	await tx.execute(sql`
		insert into prices (producer_id, id, tier_id, product_id, min_cases, case_cents, pound_cents, valid_from)
		select ${producerId}, gen_random_uuid(), r."tierId", r."productId", r."minCases", r."caseCents", r."poundCents",
			r."validFrom"
		from json_to_recordset(${JSON.stringify(changed)}::json) as r("tierId" uuid, "productId" uuid, "minCases" smallint,
			"caseCents" integer, "poundCents" integer, "validFrom" date)
		on conflict on constraint prices_break_once
		do update set case_cents = excluded.case_cents, pound_cents = excluded.pound_cents`)
	const productIds = [...new Set(changed.map(({ productId }) => productId))]
	await tx.insert(auditEntries).values(
		productIds.map((productId) => ({
			producerId,
			at,
			userId: personId,
			action: "set-prices",
			subjectType: "product",
			subjectId: productId,
			detail: { prices: changed.filter((price) => price.productId === productId) },
		})),
	)
}
