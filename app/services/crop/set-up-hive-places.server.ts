import { sql } from "drizzle-orm"
import { auditEntries } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import type { Result } from "~/domain/result"

/** Where hives go: to another yard with all that is on them, out of use, or back in use. */
export type HiveChange = { to: "yard"; yardId: string } | { to: "retired" } | { to: "in-use" }

export type HivePlacesRefusal =
	| { ok: false; reason: "none-chosen" | "gone" | "no-such-yard" }
	/** Hives with a super on cannot be retired: what is on them is still expected. */
	| { ok: false; reason: "supers-on"; labels: string[] }

/** Moves many hives, retires them or puts them back in use, all or none. */
export async function setUpHivePlaces(given: {
	producerId: string
	personId: string
	hiveIds: readonly string[]
	change: HiveChange
}): Promise<Result<{ count: number }, HivePlacesRefusal>> {
	const { producerId, personId, change } = given
	const hiveIds = [...new Set(given.hiveIds)]
	if (hiveIds.length === 0) return { ok: false, reason: "none-chosen" }
	return withProducer(producerId, async (tx) => {
		const ids = sql.param(hiveIds)
		// Setting a super on takes the same locks, so none goes on while its hive is retired.
		const found = await tx.execute(sql`
			select id from hives where producer_id = ${producerId} and id = any(${ids}::uuid[]) order by id for no key update`)
		if (found.rows.length < hiveIds.length) return { ok: false, reason: "gone" }
		if (change.to === "yard") {
			const yard = await tx.execute(sql`
				select id from yards where producer_id = ${producerId} and id = ${change.yardId} and is_active`)
			if (yard.rows.length === 0) return { ok: false, reason: "no-such-yard" }
		}
		if (change.to === "retired") {
			const busy = await tx.execute<{ label: string }>(sql`
				select distinct h.label from hives h join supers s on s.producer_id = h.producer_id and s.hive_id = h.id
				where h.producer_id = ${producerId} and h.id = any(${ids}::uuid[]) and s.state <> 'off' order by h.label`)
			if (busy.rows.length > 0) return { ok: false, reason: "supers-on", labels: busy.rows.map(({ label }) => label) }
		}
		await tx.execute(sql`
			update hives set is_active = ${change.to !== "retired"},
				yard_id = coalesce(${change.to === "yard" ? change.yardId : null}::uuid, yard_id)
			where producer_id = ${producerId} and id = any(${ids}::uuid[])`)
		await tx.insert(auditEntries).values(
			hiveIds.map((subjectId) => ({
				producerId,
				userId: personId,
				action: change.to === "yard" ? "hive moved" : change.to === "retired" ? "hive retired" : "hive put back in use",
				subjectType: "hive",
				subjectId,
				detail: change.to === "yard" ? { yardId: change.yardId } : {},
			})),
		)
		return { ok: true, count: hiveIds.length }
	})
}
