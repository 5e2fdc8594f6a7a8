import { createHash } from "node:crypto"
import { sql } from "drizzle-orm"
import { auditEntries, supers } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Day } from "~/domain/calendar"
import type { Result } from "~/domain/result"
import { refreshExpected } from "./refresh-expected.server"

const HIGHEST_LEVEL = 20

export type SetUpSupersRefusal = {
	ok: false
	reason: "none-chosen" | "gone" | "no-such-product" | "in-the-future" | "too-high"
}

/**
 * Sets one super on each of many hives, on top of what is there. A second send of the same form (`idempotencyKey`) sets
 * nothing on again. Refuses a day after today, hives that are not in use, a product that is not sold any more, and a
 * stack of more than twenty.
 */
export async function setUpSupers(given: {
	producerId: string
	personId: string
	today: Day
	hiveIds: readonly string[]
	productId: string
	capacityPieces: number
	setOn: Day
	idempotencyKey: string
}): Promise<Result<{ setOn: number }, SetUpSupersRefusal>> {
	const { producerId, personId, today, productId, capacityPieces, setOn, idempotencyKey } = given
	const hiveIds = [...new Set(given.hiveIds)]
	if (hiveIds.length === 0) return { ok: false, reason: "none-chosen" }
	if (setOn > today) return { ok: false, reason: "in-the-future" }
	return withProducer(producerId, async (tx) => {
		const hives = await tx.execute<{ id: string }>(sql`
			select id from hives
			where producer_id = ${producerId} and id = any(${sql.param(hiveIds)}::uuid[]) and is_active
			order by id for no key update`)
		if (hives.rows.length < hiveIds.length) return { ok: false, reason: "gone" }
		const products = await tx.execute(sql`
			select id from products where producer_id = ${producerId} and id = ${productId} and is_active`)
		if (products.rows.length === 0) return { ok: false, reason: "no-such-product" }
		const stacks = await tx.execute<{ hiveId: string; top: number }>(sql`
			select hive_id as "hiveId", max(level)::int as top from supers
			where producer_id = ${producerId} and hive_id = any(${sql.param(hiveIds)}::uuid[]) and state <> 'off'
			group by hive_id`)
		const tops = new Map(stacks.rows.map(({ hiveId, top }) => [hiveId, top]))
		const levelOn = (hiveId: string) => (tops.get(hiveId) ?? 0) + 1
		if (hiveIds.some((hiveId) => levelOn(hiveId) > HIGHEST_LEVEL)) return { ok: false, reason: "too-high" }
		const made = await tx
			.insert(supers)
			.values(
				hiveIds.map((hiveId) => ({
					producerId,
					id: idFor(idempotencyKey, hiveId),
					hiveId,
					productId,
					capacityPieces,
					setOn,
					level: levelOn(hiveId),
				})),
			)
			.onConflictDoNothing()
			.returning({ id: supers.id })
		if (made.length === 0) return { ok: true, setOn: 0 }
		await tx.insert(auditEntries).values(
			made.map(({ id }) => ({
				producerId,
				userId: personId,
				action: "super set on",
				subjectType: "super",
				subjectId: id,
				detail: { on: setOn, capacityPieces },
			})),
		)
		await refreshExpected(tx, { producerId, today, productIds: [productId] })
		return { ok: true, setOn: made.length }
	})
}

/** The same form and hive make the same id, so that what was sent twice meets at its key. */
function idFor(idempotencyKey: string, hiveId: string): string {
	const hex = createHash("sha256").update(`${idempotencyKey} ${hiveId}`).digest("hex")
	return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-8${hex.slice(13, 16)}-a${hex.slice(17, 20)}-${hex.slice(20, 32)}`
}
